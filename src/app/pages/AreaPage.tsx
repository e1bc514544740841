export function AreaPage() {
  return null;
}
