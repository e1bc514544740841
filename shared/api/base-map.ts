// scheme, host with letters, figures, dots, hyphens and {s} only, port, path.
const TEMPLATE = /^(https?):\/\/((?:[a-z0-9.-]|\{s\})+)(:\d{1,5})?(\/\S*)$/i;
const PLACEHOLDERS = new Set(["{s}", "{z}", "{x}", "{y}", "{r}"]);

/** The servers that {s} stands for, as map libraries take it. */
const SUBDOMAINS = ["a", "b", "c"];

/**
 * The origins that an XYZ template fetches its pictures from, such as `https://a.tiles.example.org`; null where the text is
 * no template that can be used: not HTTP, no {z}, {x} and {y}, another placeholder, or a host with anything odd in it.
 */
export function baseMapOrigins(template: string): readonly string[] | null {
  const [whole, scheme, host, port = "", path] = TEMPLATE.exec(template) ?? [];
  if (whole === undefined || scheme === undefined || host === undefined || path === undefined) return null;
  const placeholders: readonly string[] = path.match(/\{[^{}]*\}/g) ?? [];
  if (!["{z}", "{x}", "{y}"].every((needed) => placeholders.includes(needed))) return null;
  if (!placeholders.every((placeholder) => PLACEHOLDERS.has(placeholder))) return null;
  const hosts = host.includes("{s}") ? SUBDOMAINS.map((name) => host.replaceAll("{s}", name)) : [host];
  return hosts.map((one) => `${scheme}://${one}${port}`.toLowerCase());
}
