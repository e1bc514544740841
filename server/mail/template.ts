/** What a template makes: a mail in both its forms. */
export interface Written {
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** A paragraph of text, or a link on a line of its own, or a line to be copied such as a hash. */
export type Block = string | Link | { readonly copy: string };

interface Link {
  readonly link: string;
}

/** An address on a line of its own. */
export function linkLine(address: string): Link {
  return { link: address };
}

/** Writes a mail in plain text and in plain HTML from the same blocks: no pictures, no styles that could be lost. */
export function write(subject: string, blocks: readonly Block[]): Written {
  const one = subject.replace(/\s+/g, " ").trim();
  return {
    subject: one,
    text: `${blocks.map(asText).join("\n\n")}\n`,
    html: `<!doctype html><html><head><meta charset="utf-8"><title>${escaped(one)}</title></head><body>${blocks.map(asHtml).join("")}</body></html>`,
  };
}

/** What somebody typed, as words in a line: without line breaks, and without marks that turn the text around them. */
export function asWords(typed: string): string {
  return typed
    .replace(/[\u061c\u200e\u200f\u202a-\u202e\u2066-\u2069]/g, "")
    .replace(/[\p{Cc}\s]+/gu, " ")
    .trim();
}

function asText(block: Block): string {
  if (typeof block === "string") return block;
  return "link" in block ? block.link : block.copy;
}

function asHtml(block: Block): string {
  if (typeof block === "string") return `<p>${escaped(block).replaceAll("\n", "<br>")}</p>`;
  if ("copy" in block) return `<p><code>${escaped(block.copy)}</code></p>`;
  return `<p><a href="${escaped(block.link)}">${escaped(block.link)}</a></p>`;
}

const ENTITIES: Readonly<Record<string, string>> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;" };

function escaped(text: string): string {
  return text.replace(/[&<>"]/g, (character) => ENTITIES[character] ?? character);
}
