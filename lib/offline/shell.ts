/**
 * Keeps the pages themselves on the phone. The service worker stores what it is told to, page
 * and parts together, so that a new version takes over only when it is there as a whole.
 */
const WORKER = "/service-worker.js";

/** The faces of the field pages, and letters and signs that draw in each subset they use. */
const FACES = ["Roboto", "Roboto Condensed", "Roboto Mono", "Roboto Serif"].map(
  (name) => `1rem "${name} Variable"`,
);
const LETTERS = "Aa0 µ°−–×·‹✓✕⌫₂";

/** Call when every part of the field pages has been loaded once. */
export async function keepShell(): Promise<void> {
  if (!("serviceWorker" in navigator)) return;
  await navigator.serviceWorker.register(WORKER, { scope: "/", updateViaCache: "none" });
  const registration = await navigator.serviceWorker.ready;
  await Promise.all(FACES.map((face) => document.fonts.load(face, LETTERS)));
  registration.active?.postMessage({ act: "keep", parts: partsInUse() });
}

/** The scripts, styles and fonts this page has loaded. */
function partsInUse(): string[] {
  const paths = performance
    .getEntriesByType("resource")
    .map((entry) => new URL(entry.name))
    .filter((url) => url.origin === location.origin)
    .map((url) => url.pathname);
  return [...new Set(paths.filter((path) => path.startsWith("/_next/static/")))];
}

/** Takes the kept pages off the phone, at sign-out. */
export async function forgetShell(): Promise<void> {
  if (!("serviceWorker" in navigator)) return;
  const registration = await navigator.serviceWorker.getRegistration("/");
  registration?.active?.postMessage({ act: "forget" });
}
