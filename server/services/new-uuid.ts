import type { Platform } from "../context.ts";

/** A version 4 UUID (RFC 9562) from the platform's random source, for entries that no client made. */
export function newUuid(platform: Pick<Platform, "random">): string {
  const bytes = Buffer.from(platform.random(16));
  bytes.writeUInt8((bytes.readUInt8(6) & 0x0f) | 0x40, 6);
  bytes.writeUInt8((bytes.readUInt8(8) & 0x3f) | 0x80, 8);
  const hex = bytes.toString("hex");
  return [hex.slice(0, 8), hex.slice(8, 12), hex.slice(12, 16), hex.slice(16, 20), hex.slice(20)].join("-");
}
