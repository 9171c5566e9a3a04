import sharp from "sharp";
import type { ImageCleaner } from "@/lib/usecases/use-case";
import { imageType } from "./image-type";

/** A phone's largest picture; what claims more is refused before it is unpacked. */
const MOST_PIXELS = 50_000_000;
/** Larger ones are made smaller: nobody needs more to see a terminal. */
const EDGE_PX = 2400;
const PATIENCE_S = 10;

/**
 * Unpacks a picture and packs it anew as JPEG, upright and without any metadata: neither where it
 * was taken nor whatever else was hidden in the file gets through.
 */
export const cleanImage: ImageCleaner = async (bytes) => {
  if (imageType(bytes) === null) {
    return { ok: false, reason: "This file is no photo: only JPEG, PNG and WebP are taken." };
  }
  try {
    const { data, info } = await sharp(bytes, { limitInputPixels: MOST_PIXELS, failOn: "error" })
      .timeout({ seconds: PATIENCE_S })
      .rotate()
      .resize({ width: EDGE_PX, height: EDGE_PX, fit: "inside", withoutEnlargement: true })
      .flatten({ background: "#ffffff" })
      .jpeg({ quality: 85 })
      .toBuffer({ resolveWithObject: true });
    return { ok: true, image: { bytes: data, width: info.width, height: info.height } };
  } catch (error) {
    return { ok: false, reason: reasonOf(error) };
  }
};

function reasonOf(error: unknown): string {
  const told = error instanceof Error ? error.message : "";
  if (/pixel limit/i.test(told)) {
    return `This photo claims more than ${MOST_PIXELS / 1_000_000} million pixels: take it anew.`;
  }
  return "This photo is broken and cannot be read: take it anew.";
}
