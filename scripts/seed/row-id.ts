import { createHash } from "node:crypto";

/**
 * The same id for the same thing in every seeding (RFC 9562 version 8: a hash of our own
 * choosing), so that two seedings of one moment are alike to the last row.
 */
export function rowId(kind: string, key: string): string {
  const hex = createHash("sha256").update(`quillmere/${kind}/${key}`).digest("hex");
  const variant = ((parseInt(hex.charAt(16), 16) & 0x3) | 0x8).toString(16);
  return [
    hex.slice(0, 8),
    hex.slice(8, 12),
    `8${hex.slice(13, 16)}`,
    `${variant}${hex.slice(17, 20)}`,
    hex.slice(20, 32),
  ].join("-");
}
