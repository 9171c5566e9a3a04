import { openFieldDatabase } from "./database";
import { FieldStore } from "./field-store";
import { sendInBackground } from "./background-sync";
import { browserTransport } from "./transport";

const CHANNEL = "wanewright-field";

let store: FieldStore | null = null;

/** The store of this tab, made on first use. */
export function fieldStore(): FieldStore {
  store ??= connect();
  return store;
}

function connect(): FieldStore {
  const channel = typeof BroadcastChannel === "undefined" ? null : new BroadcastChannel(CHANNEL);
  const made = new FieldStore({
    open: (outdated) => openFieldDatabase(undefined, outdated),
    transport: browserTransport(),
    now: () => new Date(),
    newId: () => crypto.randomUUID(),
    chance: () => Math.random(),
    later: (work, ms) => void setTimeout(work, ms),
    announce: () => channel?.postMessage("changed"),
    shrink: async (bytes, edgePx) => (await import("./shrink-photo")).shrinkPicture(bytes, edgePx),
    sendInBackground,
  });
  // The service worker may have sent entries: asking again settles them here.
  const hear = (word: unknown) => (word === "sent" ? made.exchange() : made.reload());
  channel?.addEventListener("message", (event) => void hear(event.data));
  return made;
}

/** What the store loads when it is first needed: on the phone before the signal goes. */
export const loadTraffic = () =>
  Promise.all([import("./flush-all"), import("./keep-with-photos"), import("./shrink-photo")]);

/**
 * Starts the store and keeps it going: signal that returns, a page that comes back into view.
 * @returns what stops it
 */
export function runFieldStore(): () => void {
  const running = fieldStore();
  const again = () => void running.exchange();
  const seen = () => {
    if (document.visibilityState === "visible") again();
  };
  window.addEventListener("online", again);
  document.addEventListener("visibilitychange", seen);
  void running.start();
  // Asked once: without it a full phone may throw away what is kept.
  void navigator.storage?.persist?.();
  return () => {
    window.removeEventListener("online", again);
    document.removeEventListener("visibilitychange", seen);
  };
}
