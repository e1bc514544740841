export function FramePage() {
  return null;
}
