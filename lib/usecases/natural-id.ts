import { createHash } from "node:crypto";

/**
 * An id made from what a thing is called, so that a file imported twice finds what it made:
 * a name-based UUID (RFC 9562, version 8: a digest of our own layout).
 */
export function naturalId(kind: string, ...parts: readonly (string | number)[]): string {
  const digest = createHash("sha256")
    .update([kind, ...parts].join("\u001f"))
    .digest();
  digest[6] = ((digest[6] ?? 0) & 0x0f) | 0x80;
  digest[8] = ((digest[8] ?? 0) & 0x3f) | 0x80;
  const hex = digest.toString("hex", 0, 16);
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-${hex.slice(12, 16)}-${hex.slice(16, 20)}-${hex.slice(20)}`;
}
