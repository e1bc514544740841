import type { Platform } from "../context.ts";

/** 128 bits of the random source as a short text: opaque, and safe in an address. */
export function newId(platform: Pick<Platform, "random">): string {
  return Buffer.from(platform.random(16)).toString("base64url");
}
