import { DOMParser, type Document } from "@xmldom/xmldom";
import { Problem } from "#shared/problem.ts";

const MAX_CHARACTERS = 60_000_000;

/** What stands before the outermost element, comments and processing instructions taken away, may declare no document type. */
function refuseDeclarations(text: string, kind: string): void {
  const prolog = text.replace(/^\s*(?:<\?[^]*?\?>\s*|<!--[^]*?-->\s*)*/, "");
  if (/^<!/.test(prolog)) {
    throw new Problem(
      "file-unsafe",
      `This ${kind} declares a document type or entities, which can hide harmful content. Save it again as plain ${kind} or as GeoJSON.`,
    );
  }
}

/**
 * A boundary file in XML to its document. Declarations of entities are refused before anything is parsed.
 * @throws Problem file-unsafe for a document type or more than 60 MB; file-damaged where it is not well-formed.
 */
export function parseXml(text: string, kind: "KML" | "GPX"): Document {
  if (text.length > MAX_CHARACTERS)
    throw new Problem("file-unsafe", `This ${kind} is larger than 60 MB. Keep only the boundary in it.`);
  refuseDeclarations(text, kind);
  let complaint = "";
  try {
    return new DOMParser({
      onError: (level, message) => {
        if (level !== "warning" && complaint === "") complaint = message;
        if (level === "fatalError") throw new Error(message);
      },
    }).parseFromString(text, "application/xml");
  } catch (error) {
    const message = complaint === "" && error instanceof Error ? error.message : complaint;
    const line = /\[line:(\d+),col:(\d+)\]|:(\d+):(\d+)/.exec(message);
    throw new Problem(
      "file-damaged",
      `The ${kind} is not well-formed XML${line?.[1] === undefined ? "" : ` at line ${line[1]}`}. It may be cut short; export it again.`,
    );
  }
}
