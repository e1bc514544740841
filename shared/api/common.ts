import * as z from "zod/mini";
import { ROLES } from "#shared/access/table.ts";

/** Shapes that several endpoints use. */
export const none = z.object({});
export const id = z.string().check(z.regex(/^[A-Za-z0-9_-]{1,64}$/, "is not an id"));
/** Made by the client, so that an entry that is sent twice is kept once. */
export const uuid = z.uuid();
export const sha256Hex = z.string().check(z.regex(/^[0-9a-f]{64}$/, "is not a SHA-256 in lower-case hexadecimal"));
export const utc = z.iso.datetime();
export const role = z.enum(ROLES);
export const email = z.string().check(z.trim(), z.toLowerCase(), z.maxLength(254), z.email("is not an e-mail address"));
/** A short text that a person typed: outer spaces off, not empty. */
export const shortText = z.string().check(z.trim(), z.minLength(1, "is empty"), z.maxLength(200));
export const longText = z.string().check(z.trim(), z.maxLength(4000));
export const reason = z.string().check(z.trim(), z.minLength(3, "needs at least three characters"), z.maxLength(1000));
export const surveyParams = z.object({ surveyId: id });

/** [polygon][ring][vertex][x, y], in whole millimetres of a plane or in degrees, as the endpoint says. */
export const polygons = z.array(z.array(z.array(z.tuple([z.number(), z.number()]))));
