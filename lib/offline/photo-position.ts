/**
 * Where a photo was taken, from the Exif part of a JPEG: the GPS directory's latitude and longitude
 * (CIPA DC-008-2023, 4.6.6) in the TIFF structure (TIFF 6.0, section 2) of the first APP1 segment
 * (ITU-T T.81, B.2.4.6). Nothing else in the file is looked at.
 */
import type { PhotoPosition } from "@/lib/sync/photos";

/** A JPEG has it near its start; a segment holds 64 kB at most, and a few may stand before it. */
const LOOK_BYTES = 256 * 1024;
const EXIF = [0x45, 0x78, 0x69, 0x66, 0, 0];
const APP1 = 0xe1;
const START_OF_SCAN = 0xda;
const GPS_DIRECTORY = 0x8825;
const [LATITUDE_SIGN, LATITUDE, LONGITUDE_SIGN, LONGITUDE] = [1, 2, 3, 4];

/** @returns null when the file does not say, or says what cannot be */
export async function positionOf(photo: Blob): Promise<PhotoPosition | null> {
  const bytes = new DataView(await photo.slice(0, LOOK_BYTES).arrayBuffer());
  try {
    const start = exifStart(bytes);
    return start === null ? null : readPosition(bytes, start);
  } catch (error) {
    // A broken file points outside itself; it is then a photo without position.
    if (error instanceof RangeError) return null;
    throw error;
  }
}

/** Where the TIFF structure begins. */
function exifStart(bytes: DataView): number | null {
  if (bytes.getUint16(0) !== 0xffd8) return null;
  for (let at = 2; at + 4 < bytes.byteLength; at += 2 + bytes.getUint16(at + 2)) {
    if (bytes.getUint8(at) !== 0xff) return null;
    const marker = bytes.getUint8(at + 1);
    if (marker === START_OF_SCAN) return null;
    const isExif = EXIF.every((byte, n) => bytes.getUint8(at + 4 + n) === byte);
    if (marker === APP1 && isExif) return at + 4 + EXIF.length;
  }
  return null;
}

function readPosition(bytes: DataView, start: number): PhotoPosition | null {
  const little = bytes.getUint16(start) === 0x4949;
  const u16 = (at: number) => bytes.getUint16(start + at, little);
  const u32 = (at: number) => bytes.getUint32(start + at, little);
  if (u16(2) !== 42) return null;
  /** Where an entry of a directory begins, by its tag. */
  const entryOf = (directory: number, tag: number): number | null => {
    for (let n = 0; n < u16(directory); n++) {
      const at = directory + 2 + 12 * n;
      if (u16(at) === tag) return at;
    }
    return null;
  };
  const pointer = entryOf(u32(4), GPS_DIRECTORY);
  if (pointer === null) return null;
  const gps = u32(pointer + 8);
  /** Degrees, minutes and seconds as three fractions; a hemisphere as one letter. */
  const degrees = (signTag: number, tag: number, most: number): number | null => {
    const [sign, value] = [entryOf(gps, signTag), entryOf(gps, tag)];
    if (sign === null || value === null || u32(value + 4) !== 3) return null;
    const [d, m, s] = [0, 8, 16].map((n) => u32(u32(value + 8) + n) / u32(u32(value + 8) + n + 4));
    const total = (d ?? NaN) + (m ?? NaN) / 60 + (s ?? NaN) / 3600;
    const letter = String.fromCharCode(bytes.getUint8(start + sign + 8));
    return total <= most ? total * (letter === "S" || letter === "W" ? -1 : 1) : null;
  };
  const latitude = degrees(LATITUDE_SIGN, LATITUDE, 90);
  const longitude = degrees(LONGITUDE_SIGN, LONGITUDE, 180);
  return latitude === null || longitude === null ? null : { latitude, longitude };
}
