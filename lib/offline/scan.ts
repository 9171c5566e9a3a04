/** The part of the Shape Detection API that is used; TypeScript's library has none of it. */
interface Detector {
  detect(source: HTMLVideoElement): Promise<readonly { readonly rawValue: string }[]>;
}
interface DetectorMaker {
  new (options: { formats: string[] }): Detector;
  getSupportedFormats(): Promise<string[]>;
}

const WANTED = ["qr_code", "code_128", "data_matrix"];
const LOOK_EVERY_MS = 250;

/** The browser's own detector, where it reads the codes that stand on plates. */
async function ownDetector(): Promise<Detector | null> {
  const Maker = (globalThis as { BarcodeDetector?: DetectorMaker }).BarcodeDetector;
  const known = (await Maker?.getSupportedFormats().catch(() => [])) ?? [];
  const formats = known.filter((format) => WANTED.includes(format));
  return Maker && formats.includes("qr_code") ? new Maker({ formats }) : null;
}

type Look = (video: HTMLVideoElement) => Promise<string | null>;

async function looker(): Promise<Look> {
  const own = await ownDetector();
  if (own) return async (video) => (await own.detect(video))[0]?.rawValue ?? null;
  const { decodeFrame } = await import("./decode-code");
  const canvas = document.createElement("canvas");
  return (video) => decodeFrame(video, canvas);
}

/** Gets the decoder onto the phone while there is signal, where the browser has none of its own. */
export async function prepareScanning(): Promise<void> {
  if (!hasCamera() || (await ownDetector())) return;
  const { fetchDecoder } = await import("./decode-code");
  await fetchDecoder();
}

/** Whether the browser gives cameras to pages at all. */
export function hasCamera(): boolean {
  return "mediaDevices" in navigator && Boolean(navigator.mediaDevices.getUserMedia);
}

/**
 * Shows the back camera in `video` and looks for a code.
 * @returns what stops it and lets go of the camera
 */
export function watchForCode(
  video: HTMLVideoElement,
  report: { found: (code: string) => void; failed: (why: string) => void },
): () => void {
  let stopped = false;
  let stream: MediaStream | null = null;
  const stop = () => {
    stopped = true;
    for (const track of stream?.getTracks() ?? []) track.stop();
  };
  const run = async () => {
    const look = looker();
    look.catch(() => undefined);
    stream = await navigator.mediaDevices.getUserMedia({ video: { facingMode: "environment" } });
    if (stopped) return stop();
    video.srcObject = stream;
    await video.play();
    const next = await look;
    while (!stopped) {
      const code = await next(video);
      if (code && !stopped) return report.found(code);
      await new Promise((resolve) => setTimeout(resolve, LOOK_EVERY_MS));
    }
  };
  run()
    .catch((error: unknown) => {
      if (!stopped) report.failed(cameraTrouble(error));
    })
    .finally(stop);
  return stop;
}

/** Why there is no picture, and what to do; names as the Media Capture specification has them. */
function cameraTrouble(error: unknown): string {
  switch (error instanceof Error ? error.name : "") {
    case "NotAllowedError":
      return "The camera is not allowed for this site. Allow it by the sign beside the address, then press again; or type the tag.";
    case "NotFoundError":
    case "OverconstrainedError":
      return "The browser finds no camera on this phone: type the tag.";
    case "NotReadableError":
      return "Another app holds the camera. Close it and press again, or type the tag.";
    default:
      return "The camera could not be used: type the tag.";
  }
}
