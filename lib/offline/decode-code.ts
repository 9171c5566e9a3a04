/**
 * The decoder for browsers without one of their own: ZXing's C++ reader as WebAssembly, served from
 * our own origin. Loaded only where it is needed.
 */
import { prepareZXingModule, readBarcodes } from "zxing-wasm/reader";

const WASM = new URL("zxing-wasm/reader/zxing_reader.wasm", import.meta.url).href;
/** Enough to read a plate held before the camera; more only takes longer. */
const LOOK_PX = 800;

prepareZXingModule({
  overrides: {
    locateFile: (path: string, prefix: string) => (path.endsWith(".wasm") ? WASM : prefix + path),
  },
});

/** Fetches the decoder's parts, so that it works without signal later. */
export async function fetchDecoder(): Promise<void> {
  await prepareZXingModule({ fireImmediately: true });
}

/** The first code in the picture that the video shows now; null when there is none. */
export async function decodeFrame(
  video: HTMLVideoElement,
  canvas: HTMLCanvasElement,
): Promise<string | null> {
  const scale = Math.min(1, LOOK_PX / Math.max(video.videoWidth, video.videoHeight, 1));
  canvas.width = Math.max(1, Math.round(video.videoWidth * scale));
  canvas.height = Math.max(1, Math.round(video.videoHeight * scale));
  const pen = canvas.getContext("2d", { willReadFrequently: true });
  if (!pen) return null;
  pen.drawImage(video, 0, 0, canvas.width, canvas.height);
  const picture = pen.getImageData(0, 0, canvas.width, canvas.height);
  const codes = await readBarcodes(picture, {
    formats: ["QRCode", "Code128", "DataMatrix"],
    maxNumberOfSymbols: 1,
  });
  return codes[0]?.text || null;
}
