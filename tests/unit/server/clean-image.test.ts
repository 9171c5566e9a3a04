/**
 * Hostile and honest pictures. Signatures: ITU-T T.81, W3C PNG, RFC 9649. What a JPEG carries
 * besides the picture is looked for in the bytes themselves (APP1 "Exif", ITU-T T.81 B.2.4.6 and
 * CIPA DC-008), not asked of the code under test; sizes are sharp's, an image library.
 */
import { deflateSync } from "node:zlib";
import sharp from "sharp";
import { describe, expect, it } from "vitest";
import { cleanImage } from "@/lib/server/clean-image";
import { imageType } from "@/lib/server/image-type";

const field = { width: 300, height: 200, channels: 3, background: "#3a7" } as const;
const picture = () => sharp({ create: field });

async function refused(bytes: Uint8Array): Promise<string> {
  const result = await cleanImage(bytes);
  if (result.ok) throw new Error("it was taken");
  return result.reason;
}

async function taken(bytes: Uint8Array) {
  const result = await cleanImage(bytes);
  if (!result.ok) throw new Error(result.reason);
  return result.image;
}

/** A PNG that claims a size and holds next to nothing: unpacked it would take gigabytes. */
function pngClaiming(width: number, height: number): Buffer {
  const chunk = (name: string, data: Buffer) => {
    const body = Buffer.concat([Buffer.from(name), data]);
    const out = Buffer.alloc(body.length + 8);
    out.writeUInt32BE(data.length, 0);
    body.copy(out, 4);
    out.writeUInt32BE(crc32(body), body.length + 4);
    return out;
  };
  const head = Buffer.alloc(13);
  head.writeUInt32BE(width, 0);
  head.writeUInt32BE(height, 4);
  head.set([8, 2, 0, 0, 0], 8);
  const signature = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]);
  const data = chunk("IDAT", deflateSync(Buffer.alloc(1_000_000)));
  return Buffer.concat([signature, chunk("IHDR", head), data, chunk("IEND", Buffer.alloc(0))]);
}

/** CRC-32 as the PNG standard's annex D has it. */
function crc32(bytes: Buffer): number {
  let crc = ~0;
  for (const byte of bytes) {
    crc ^= byte;
    for (let bit = 0; bit < 8; bit++) crc = crc & 1 ? (crc >>> 1) ^ 0xedb88320 : crc >>> 1;
  }
  return ~crc >>> 0;
}

describe("what is taken", () => {
  it("JPEG, PNG and WebP, told by their first bytes", async () => {
    for (const kind of ["jpeg", "png", "webp"] as const) {
      const bytes = await picture().toFormat(kind).toBuffer();
      expect(imageType(bytes)).toBe(kind);
      const image = await taken(bytes);
      expect(imageType(image.bytes)).toBe("jpeg");
      expect([image.width, image.height]).toEqual([300, 200]);
    }
  });

  it("comes out without position, maker or anything else", async () => {
    const secret = "GPS 52.5N 0.1E";
    const bytes = await picture()
      .withExif({
        IFD0: { Make: secret, ImageDescription: secret },
        IFD3: { GPSAreaInformation: "fen" },
      })
      .jpeg()
      .toBuffer();
    expect(bytes.includes("Exif")).toBe(true);
    expect(bytes.includes(secret)).toBe(true);
    const { bytes: clean } = await taken(bytes);
    expect(Buffer.from(clean).includes("Exif")).toBe(false);
    expect(Buffer.from(clean).includes(secret)).toBe(false);
  });

  it("stands upright though the phone lay on its side", async () => {
    const bytes = await picture().withMetadata({ orientation: 6 }).jpeg().toBuffer();
    const { width, height } = await taken(bytes);
    expect([width, height]).toEqual([200, 300]);
  });

  it("is made smaller when it is larger than anybody needs", async () => {
    const bytes = await sharp({ create: { ...field, width: 5000, height: 1000 } })
      .jpeg()
      .toBuffer();
    expect((await taken(bytes)).width).toBe(2400);
  });
});

describe("what is refused", () => {
  it("drawings with script, pages, archives, empty files, whatever they call themselves", async () => {
    const svg = '<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>';
    const files = [
      svg,
      `<?xml version="1.0"?>${svg}`,
      "<html>",
      "PK\u0003\u0004",
      "",
      "GIF89a",
      "%PDF-1.7",
    ];
    for (const text of files) expect(await refused(Buffer.from(text))).toContain("no photo");
  });

  it("a drawing behind a photo's first bytes", async () => {
    const bytes = Buffer.concat([
      Buffer.from([0xff, 0xd8, 0xff, 0xe0]),
      Buffer.from("<svg><script>alert(1)</script></svg>"),
    ]);
    expect(await refused(bytes)).toContain("broken");
  });

  it("half a photo", async () => {
    const whole = await sharp({ create: { ...field, width: 1200, height: 900 } })
      .composite([
        {
          input: await sharp({
            create: { ...field, noise: { type: "gaussian", mean: 128, sigma: 60 } },
          })
            .png()
            .toBuffer(),
          tile: true,
        },
      ])
      .jpeg()
      .toBuffer();
    expect(await refused(whole.subarray(0, Math.floor(whole.length / 2)))).toContain("broken");
  });

  it("a small file that would unpack to billions of pixels, at once", async () => {
    const bomb = pngClaiming(60_000, 60_000);
    expect(bomb.length).toBeLessThan(5000);
    const began = performance.now();
    expect(await refused(bomb)).toContain("million pixels");
    expect(performance.now() - began).toBeLessThan(2000);
  });
});
