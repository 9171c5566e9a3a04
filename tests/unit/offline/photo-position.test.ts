/**
 * Where a photo was taken. The pictures and their Exif are written by another library (sharp, libexif
 * after CIPA DC-008); the degrees are arithmetic on what was written.
 */
import sharp from "sharp";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { positionOf } from "@/lib/offline/photo-position";

const plain = () =>
  sharp({ create: { width: 40, height: 30, channels: 3, background: "#385" } }).jpeg();

async function photo(gps: Record<string, string>): Promise<Buffer> {
  return plain()
    .withExif({ IFD0: { Make: "Fen camera" }, IFD3: gps })
    .toBuffer();
}

const at = {
  ...{ GPSLatitudeRef: "N", GPSLatitude: "52/1 30/1 36/10" },
  ...{ GPSLongitudeRef: "W", GPSLongitude: "0/1 6/1 7200/1000" },
};
const blob = (bytes: Buffer) => new Blob([new Uint8Array(bytes)]);

describe("a photo's position", () => {
  it("is read in degrees, west and south below zero", async () => {
    // 52° 30' 3.6" is 52.501°, 0° 6' 7.2" is 0.102°.
    const found = await positionOf(blob(await photo(at)));
    expect(found?.latitude).toBeCloseTo(52.501, 9);
    expect(found?.longitude).toBeCloseTo(-0.102, 9);
    const south = await positionOf(
      blob(await photo({ ...at, GPSLatitudeRef: "S", GPSLongitudeRef: "E" })),
    );
    expect(south?.latitude).toBeCloseTo(-52.501, 9);
    expect(south?.longitude).toBeCloseTo(0.102, 9);
  });

  it("is none where the camera wrote none, or only half of one, or what cannot be", async () => {
    expect(await positionOf(blob(await plain().toBuffer()))).toBeNull();
    expect(await positionOf(blob(await photo({ GPSLatitude: at.GPSLatitude })))).toBeNull();
    const beyond = await photo({ ...at, GPSLatitude: "97/1 0/1 0/1" });
    expect(await positionOf(blob(beyond))).toBeNull();
    const nothing = await photo({ ...at, GPSLatitude: "52/0 30/0 0/0" });
    expect(await positionOf(blob(nothing))).toBeNull();
    expect(await positionOf(new Blob([]))).toBeNull();
    expect(await positionOf(new Blob(["GIF89a, and no photo at all"]))).toBeNull();
  });

  it("of a file cut off or spoilt anywhere is none or a place on Earth, and nothing is thrown", async () => {
    const whole = await photo(at);
    const spoilt = fc.tuple(fc.nat(whole.length - 1), fc.nat(255), fc.nat(whole.length));
    await fc.assert(
      fc.asyncProperty(spoilt, async ([place, value, end]) => {
        const bytes = Buffer.from(whole);
        bytes[place] = value;
        const found = await positionOf(blob(bytes.subarray(0, end)));
        if (!found) return;
        expect(Math.abs(found.latitude)).toBeLessThanOrEqual(90);
        expect(Math.abs(found.longitude)).toBeLessThanOrEqual(180);
      }),
      { numRuns: 500 },
    );
  });
});
