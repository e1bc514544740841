import { zipSync } from "fflate";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { crc32, listZip, MAX_UNPACKED_BYTES, unzipEntry } from "#shared/exchange/zip.ts";
import { refusalOf } from "../../fixtures/refusal.ts";
import { bytesOf, imported, textOf } from "./imports.ts";

/** Writes a 32-bit number over the first place in the directory that holds the given name's entry. */
function withDirectoryField(zip: Uint8Array, offset: number, value: number): Uint8Array {
  const changed = zip.slice();
  const view = new DataView(changed.buffer);
  for (let at = 0; at + 46 < changed.length; at++) {
    if (view.getUint32(at, true) === 0x02014b50) {
      view.setUint32(at + offset, value, true);
      return changed;
    }
  }
  throw new RangeError("no directory");
}

const SIZE = 24;
const FLAGS_AND_METHOD = 8;
const CRC = 16;

describe("the files of a zip archive", { timeout: 30_000 }, () => {
  test("are listed without folders and the leftovers of file managers", () => {
    expect(listZip(imported("made/zip_with_folder_and_mac_junk.zip")).map(({ name }) => name)).toEqual([
      "survey/ms_two_states.shp",
      "survey/ms_two_states.shx",
      "survey/ms_two_states.dbf",
      "survey/ms_two_states.prj",
    ]);
  });

  test("come out as they went in", () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 2000 }), fc.integer({ min: 0, max: 9 }), (content, level) => {
        const zip = zipSync({ "a/b.shp": content }, { level: level as 0 });
        const [entry] = listZip(zip);
        expect(entry?.size).toBe(content.length);
        if (entry !== undefined) expect(unzipEntry(zip, entry)).toEqual(content);
      }),
    );
  });

  // The check value of this CRC-32 for the nine digits is CBF43926 (catalogue of CRC parameters; zlib's documentation).
  test("are checked by the usual CRC-32", () => {
    expect(crc32(bytesOf("123456789"))).toBe(0xcbf43926);
  });

  test("with names that are not ASCII keep them", () => {
    const zip = zipSync({ "Fläche/große Düne.shp": bytesOf("x") });
    expect(listZip(zip)[0]?.name).toBe("Fläche/große Düne.shp");
  });
});

describe("a hostile or broken archive", { timeout: 30_000 }, () => {
  // 100 MB of zeros pack to about 100 kB.
  test("of more than 60 MB in all is refused before anything is unpacked", () => {
    const zip = zipSync({
      "bomb.shp": new Uint8Array(MAX_UNPACKED_BYTES / 2 + 1),
      "bomb.dbf": new Uint8Array(MAX_UNPACKED_BYTES / 2),
    });
    expect(zip.length).toBeLessThan(200_000);
    const before = process.memoryUsage().arrayBuffers;
    const { code, message } = refusalOf(() => listZip(zip));
    expect(code).toBe("file-unsafe");
    expect(message).toContain("60 MB");
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1_000_000);
  });

  test("that states a smaller size than it holds is refused", () => {
    const zip = withDirectoryField(zipSync({ "lie.shp": new Uint8Array(1_000_000) }), SIZE, 100);
    const [entry] = listZip(zip);
    expect(entry?.size).toBe(100);
    if (entry !== undefined) expect(refusalOf(() => unzipEntry(zip, entry)).code).toBe("file-damaged");
  });

  test("that states a larger size than it holds is refused", () => {
    const zip = withDirectoryField(zipSync({ "lie.shp": bytesOf("twelve bytes") }), SIZE, 5000);
    const [entry] = listZip(zip);
    if (entry !== undefined) expect(refusalOf(() => unzipEntry(zip, entry)).code).toBe("file-damaged");
  });

  test("whose content does not match its checksum is refused", () => {
    const zip = withDirectoryField(zipSync({ "a.shp": bytesOf("content") }, { level: 0 }), CRC, 1);
    const [entry] = listZip(zip);
    if (entry !== undefined) expect(refusalOf(() => unzipEntry(zip, entry)).code).toBe("file-damaged");
  });

  test("that is encrypted is refused by name", () => {
    const zip = withDirectoryField(zipSync({ "secret.shp": bytesOf("x") }), FLAGS_AND_METHOD, 1);
    const { code, message } = refusalOf(() => listZip(zip));
    expect(code).toBe("file-unsafe");
    expect(message).toContain("secret.shp");
  });

  test("with more than 10,000 files is refused", () => {
    const files = Object.fromEntries(Array.from({ length: 10_001 }, (_, i) => [`${i}.txt`, new Uint8Array(0)]));
    expect(refusalOf(() => listZip(zipSync(files, { level: 0 }))).code).toBe("file-unsafe");
  });

  test("cut short anywhere is refused, never read in part", () => {
    const zip = zipSync({ "a.shp": bytesOf("some content that is long enough".repeat(20)), "a.prj": bytesOf("WGS") });
    for (let length = 0; length < zip.length; length++) {
      expect(refusalOf(() => listZip(zip.subarray(0, length))).code, `${length} bytes`).toBe("file-damaged");
    }
  });

  test("that is no archive is refused", () => {
    expect(refusalOf(() => listZip(imported("made/not_a_zip.zip"))).code).toBe("file-damaged");
    expect(textOf(imported("made/not_a_zip.zip"))).toContain("not a zip");
  });
});
