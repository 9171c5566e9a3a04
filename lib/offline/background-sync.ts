/** The name under which the service worker sends what is kept; the same word stands in it. */
const TAG = "wanewright-outbox";

interface SyncManager {
  register(tag: string): Promise<void>;
}

/**
 * Asks the browser to wake the service worker when there is signal (Background Sync, where the
 * browser has it). Without it the pages send when they are next open.
 */
export function sendInBackground(): void {
  if (!("serviceWorker" in navigator)) return;
  void navigator.serviceWorker.ready
    .then((registration) => (registration as { sync?: SyncManager }).sync?.register(TAG))
    .catch(() => undefined);
}
