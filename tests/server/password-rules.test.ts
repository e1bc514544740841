import { expect, test } from "vitest";
import { Problem } from "#shared/problem.ts";
import { isCommonPassword } from "#server/services/common-passwords.ts";
import { hashNewPassword } from "#server/services/passwords.ts";

const ADA = { name: "Ada Quillmoor", email: "ada.quillmoor@example.org" };
async function codeOf(password: string): Promise<string> {
  try {
    await hashNewPassword(password, ADA);
    return "taken";
  } catch (error) {
    return error instanceof Problem ? error.code : "failed";
  }
}

// 11 and 12 characters; a letter outside the basic plane is one character, not two.
test("twelve characters are enough, eleven are not, counted as people count", async () => {
  expect(await codeOf("tern wadeth")).toBe("password-too-short");
  expect(await codeOf("tern wadeths")).toBe("taken");
  expect(await codeOf("𝒶".repeat(6))).toBe("password-too-short");
});

test.each([
  ["of the list", "qwertyuiop12"],
  ["in capitals", "QwertyUIOP12"],
  ["with a year", "Password2031"],
  ["with digits and a mark", "sunshine1234!"],
  ["said twice", "dragondragon"],
  ["said three times, with a year", "dragondragondragon2031"],
  ["one letter again and again", "aaaaaaaaaaaaaaaa"],
  ["three characters again and again", "xy7xy7xy7xy7"],
  ["the person's address", "ada.quillmoor@example.org"],
  ["the person's name", "Ada Quillmoor"],
  ["the person's name without its space and with a year", "adaquillmoor2031"],
])("a password that is common is refused: %s", async (_, password) => {
  expect(await codeOf(password)).toBe("password-common");
});

test.each([
  ["common words in a sentence", "password for the wet ledger"],
  ["unknown words said twice", "ternwade ternwade ok"],
  ["a common word with more digits than a date has", "dragon77294857316"],
])("a password that is not common is taken: %s", async (_, password) => {
  expect(await codeOf(password)).toBe("taken");
});

test("an empty own word makes nothing common", async () => {
  expect(await isCommonPassword("1234-tern-wade", ["", " "])).toBe(false);
});
