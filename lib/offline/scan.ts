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

function maker(): DetectorMaker | null {
  return (globalThis as { BarcodeDetector?: DetectorMaker }).BarcodeDetector ?? null;
}

async function formats(): Promise<string[]> {
  const known =
    (await maker()
      ?.getSupportedFormats()
      .catch(() => [])) ?? [];
  return known.filter((format) => WANTED.includes(format));
}

/** Whether this browser can read codes from the camera. */
export async function cameraCanScan(): Promise<boolean> {
  return "mediaDevices" in navigator && (await formats()).length > 0;
}

/**
 * Shows the back camera in `video` and looks for a code.
 * @returns what stops it and lets go of the camera
 */
export function watchForCode(
  video: HTMLVideoElement,
  report: { found: (code: string) => void; failed: () => void },
): () => void {
  let stopped = false;
  let stream: MediaStream | null = null;
  const stop = () => {
    stopped = true;
    for (const track of stream?.getTracks() ?? []) track.stop();
  };
  const run = async () => {
    const Maker = maker();
    if (!Maker) throw new Error("no detector");
    const detector = new Maker({ formats: await formats() });
    stream = await navigator.mediaDevices.getUserMedia({ video: { facingMode: "environment" } });
    if (stopped) return stop();
    video.srcObject = stream;
    await video.play();
    while (!stopped) {
      const [code] = await detector.detect(video);
      if (code && !stopped) return report.found(code.rawValue);
      await new Promise((resolve) => setTimeout(resolve, LOOK_EVERY_MS));
    }
  };
  run()
    .catch(() => {
      if (!stopped) report.failed();
    })
    .finally(stop);
  return stop;
}
