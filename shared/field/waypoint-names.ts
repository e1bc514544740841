/** Name lengths that GPS units allow, shortest first: the oldest take 6 characters. They are offered; any other may be set. */
export const NAME_LENGTHS = [6, 8, 10, 14, 30] as const;

/** What a waypoint is named by: the cell's label on the map, its unit number in the frame, or its place in the draw order. */
export const NAME_SCHEMES = ["label", "unit", "order"] as const;
export type NameScheme = (typeof NAME_SCHEMES)[number];

export interface CellToName {
  readonly label: string;
  readonly unit: number;
  readonly order: number;
}

export interface NameSettings {
  /** The most characters that the unit takes. */
  readonly length: number;
  readonly scheme?: NameScheme;
  readonly prefix?: string;
}

export interface WaypointNames {
  /** One name a cell, in the order given. Where there are clashes some are equal: don't export them. */
  readonly names: readonly string[];
  readonly clashes: readonly { readonly name: string; readonly labels: readonly string[] }[];
  /** What to change so that nothing clashes; null where nothing does. */
  readonly nextStep: string | null;
  readonly notes: readonly string[];
}

/** Upper-case Latin letters and digits only: accents come off, anything else goes. */
function plain(text: string): string {
  return text
    .normalize("NFD")
    .toUpperCase()
    .replace(/[^A-Z0-9]/g, "");
}

const digits = (values: readonly number[]): number => String(values.reduce((a, b) => Math.max(a, b), 1)).length;

function fullNames(cells: readonly CellToName[], scheme: NameScheme): string[] {
  switch (scheme) {
    case "label":
      return cells.map((cell) => plain(cell.label));
    case "unit": {
      const width = digits(cells.map((cell) => cell.unit));
      return cells.map((cell) => String(cell.unit).padStart(width, "0"));
    }
    case "order": {
      const width = digits(cells.map((cell) => cell.order));
      return cells.map((cell) => String(cell.order).padStart(width, "0"));
    }
  }
}

function findClashes(names: readonly string[], cells: readonly CellToName[]): { name: string; labels: string[] }[] {
  const byName = new Map<string, string[]>();
  cells.forEach((cell, i) => {
    const name = names[i] ?? "";
    const labels = byName.get(name);
    if (labels === undefined) byName.set(name, [cell.label]);
    else labels.push(cell.label);
  });
  return [...byName]
    .filter(([name, labels]) => name === "" || labels.length > 1)
    .map(([name, labels]) => ({ name, labels }));
}

/** The first remedy that works: a shorter prefix, a longer name, another scheme. */
function remedy(cells: readonly CellToName[], settings: Required<NameSettings>): string {
  const works = (changed: Partial<NameSettings>) => named(cells, { ...settings, ...changed }).clashes.length === 0;
  const prefix = plain(settings.prefix);
  for (let room = prefix.length - 1; room >= 0; room -= 1) {
    if (!works({ prefix: prefix.slice(0, room) })) continue;
    if (room === 0) return "Leave the prefix out.";
    return `Use a prefix of at most ${room} ${room === 1 ? "character" : "characters"}.`;
  }
  const longer = NAME_LENGTHS.find((length) => length > settings.length && works({ length }));
  const shorter = (["unit", "order"] as const).find((scheme) => scheme !== settings.scheme && works({ scheme }));
  const byWhat = shorter === "order" ? "place in the draw order" : "unit number";
  if (longer !== undefined && shorter !== undefined) {
    return `Allow ${longer} characters if the unit does, or name the waypoints by ${byWhat}.`;
  }
  if (longer !== undefined) return `Allow ${longer} characters if the unit does.`;
  if (shorter !== undefined) return `Name the waypoints by ${byWhat}.`;
  return "Leave the prefix out and name the waypoints by place in the draw order.";
}

function named(cells: readonly CellToName[], settings: Required<NameSettings>) {
  const prefix = plain(settings.prefix);
  const names = fullNames(cells, settings.scheme).map((name) => (prefix + name).slice(0, settings.length));
  return { names, clashes: findClashes(names, cells) };
}

/**
 * Names that every GPS unit keeps apart: upper-case letters and digits, prefix first, cut at `length`. A unit that meets
 * two equal names renames one silently, and a crew then stands in the wrong cell; so equal names are clashes, to be
 * settled before anything is exported, and never numbered here.
 * @throws RangeError for a length that is no whole number of at least 1
 */
export function waypointNames(cells: readonly CellToName[], settings: NameSettings): WaypointNames {
  if (!Number.isSafeInteger(settings.length) || settings.length < 1) {
    throw new RangeError(`a name has at least one character, got ${settings.length}`);
  }
  const complete = { scheme: "label", prefix: "", ...settings } as const;
  const { names, clashes } = named(cells, complete);
  const notes: string[] = [];
  const prefix = plain(complete.prefix);
  if (prefix !== complete.prefix) {
    notes.push(`The prefix is written "${prefix}": names hold upper-case letters and digits only.`);
  }
  return { names, clashes, nextStep: clashes.length === 0 ? null : remedy(cells, complete), notes };
}
