import * as accounts from "#shared/api/accounts.ts";
import * as area from "#shared/api/area.ts";
import type { Contract } from "#shared/api/contract.ts";
import * as counts from "#shared/api/counts.ts";
import * as draw from "#shared/api/draw.ts";
import * as estimate from "#shared/api/estimate.ts";
import * as field from "#shared/api/field.ts";
import * as frame from "#shared/api/frame.ts";
import * as installation from "#shared/api/installation.ts";
import * as people from "#shared/api/people.ts";
import * as record from "#shared/api/record.ts";
import * as settings from "#shared/api/settings.ts";
import * as surveys from "#shared/api/surveys.ts";

/** Whether a thing that a module exports is a contract: schemas and constants stand beside them. */
function isContract(thing: unknown): thing is Contract {
  return typeof thing === "object" && thing !== null && "guard" in thing && "answer" in thing && "path" in thing;
}

/** Every endpoint there is, in the order of the layer words. */
export const ALL_CONTRACTS: readonly Contract[] = [
  accounts,
  installation,
  people,
  surveys,
  settings,
  area,
  frame,
  draw,
  field,
  counts,
  estimate,
  record,
].flatMap((word) => Object.values<unknown>(word).filter(isContract));
