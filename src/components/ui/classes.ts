/** Class names joined with a space; what is false or absent is left out. */
export function classes(...names: readonly (string | false | null | undefined)[]): string {
  return names.filter((name) => name !== false && name !== null && name !== undefined && name !== "").join(" ");
}
