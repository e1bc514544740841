/** Whether browsers keep parts of the product shut at an address: plain HTTP, and not on the computer itself. */
export function needsHttps({ protocol, hostname }: Pick<URL, "protocol" | "hostname">): boolean {
  const isOwnComputer =
    hostname === "localhost" ||
    hostname.endsWith(".localhost") ||
    hostname === "[::1]" ||
    /^127\.\d+\.\d+\.\d+$/.test(hostname);
  return protocol === "http:" && !isOwnComputer;
}
