import { writeFileSync } from "node:fs";
import bwip from "bwip-js/node";
import sharp from "sharp";

const SIZE = { width: 640, height: 480 };
const FRAMES = 30;

/**
 * A plate with a code as a camera sees it: turned a little, softened and grainy, in the YUV4MPEG2 file
 * that Chromium plays as its fake camera. The code is drawn by another library than the one
 * that reads it (ISO/IEC 18004 and ISO/IEC 15417).
 */
export async function writeCameraPicture(
  file: string,
  code: { readonly kind: "qrcode" | "code128"; readonly text: string },
): Promise<void> {
  const drawn = await bwip.toBuffer({
    ...{ bcid: code.kind, text: code.text, scale: 3, padding: 8, backgroundcolor: "ffffff" },
    ...(code.kind === "code128" ? { height: 18 } : {}),
  });
  const plate = await sharp(drawn)
    .resize({ width: 400, height: 300, fit: "inside", kernel: "nearest" })
    .rotate(5, { background: "#777777" })
    .toBuffer();
  const noise = { type: "gaussian" as const, mean: 128, sigma: 6 };
  const grain = await sharp({ create: { ...SIZE, channels: 3, background: "#777", noise } })
    .png()
    .toBuffer();
  const luma = await sharp({ create: { ...SIZE, channels: 3, background: "#777777" } })
    .composite([{ input: plate }, { input: grain, blend: "soft-light" }])
    .blur(0.6)
    .greyscale()
    .raw()
    .toBuffer();
  const chroma = Buffer.alloc((SIZE.width * SIZE.height) / 2, 128);
  const frame = Buffer.concat([Buffer.from("FRAME\n"), luma, chroma]);
  const head = `YUV4MPEG2 W${SIZE.width} H${SIZE.height} F30:1 Ip A1:1 C420jpeg\n`;
  writeFileSync(file, Buffer.concat([Buffer.from(head), ...Array<Buffer>(FRAMES).fill(frame)]));
}
