/**
 * What a file is by its first bytes, never by its name or by what its sender says. Signatures: JPEG
 * (ITU-T T.81: SOI and the next marker), PNG (W3C PNG, 5.2), WebP (RFC 9649, 2.4).
 */
export type ImageType = "jpeg" | "png" | "webp";

const PNG = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];

/** Null: none of the kinds that are taken; drawings with script in them among them. */
export function imageType(bytes: Uint8Array): ImageType | null {
  const starts = (signature: readonly number[], at = 0) =>
    signature.every((byte, n) => bytes[at + n] === byte);
  if (starts([0xff, 0xd8, 0xff])) return "jpeg";
  if (starts(PNG)) return "png";
  return starts(letters("RIFF")) && starts(letters("WEBP"), 8) ? "webp" : null;
}

const letters = (word: string): number[] => [...word].map((letter) => letter.charCodeAt(0));
