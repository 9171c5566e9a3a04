import type { DayPack } from "@/lib/sync/day-pack";
import type { SyncResponse } from "@/lib/sync/entries";
import type { OutboxEntry } from "@/lib/sync/outbox";
import type { KeptPhoto } from "@/lib/sync/outbox-photos";

const SEND_TIMEOUT_MS = 30_000;
/** A weak signal takes minutes over a picture. */
const PHOTO_TIMEOUT_MS = 180_000;
const LOAD_TIMEOUT_MS = 20_000;
/** Statuses that sending the same again cannot change; with any other it may yet succeed. */
const UNREADABLE = new Set([400, 413, 422]);

/**
 * How a call ended. `cut`: whether it arrived is not known. `signed-out`: sign in first.
 * `refused`: the server will not have the request as it is.
 */
export type Answer<T> =
  | { readonly kind: "good"; readonly value: T }
  | { readonly kind: "cut" }
  | { readonly kind: "signed-out" }
  | { readonly kind: "refused"; readonly message: string };

export interface Transport {
  loadDay(): Promise<Answer<DayPack>>;
  /** `refused` means that this photo will never do; anything that may pass is `cut`. */
  sendPhoto(photo: KeptPhoto, bytes: ArrayBuffer): Promise<Answer<unknown>>;
  send(deviceId: string, entries: readonly OutboxEntry[]): Promise<Answer<SyncResponse>>;
}

/** The transport of a browser: same-origin requests with the session's cookie. */
export function browserTransport(): Transport {
  return {
    loadDay: () => ask<DayPack>("/api/v1/field/day", {}, LOAD_TIMEOUT_MS),
    send: (deviceId, entries) => {
      const sentAt = new Date().toISOString();
      const body = JSON.stringify({
        deviceId,
        sentAt,
        entries: entries.map(({ id, happenedAt, personId, mends = null, body }) => {
          return { id, happenedAt, personId, mends, body };
        }),
      });
      const headers = { "content-type": "application/json" };
      return ask<SyncResponse>("/api/sync", { method: "POST", headers, body }, SEND_TIMEOUT_MS);
    },
    sendPhoto: ({ id, entryId, personId, takenAt, position }, body) => {
      const query = new URLSearchParams({
        ...{ entry: entryId, person: personId, taken: takenAt },
        ...(position && { lat: String(position.latitude), lon: String(position.longitude) }),
        sent: new Date().toISOString(),
      });
      const headers = { "content-type": "image/jpeg" };
      const url = `/api/sync/photos/${id}?${query}`;
      return ask(url, { method: "PUT", headers, body }, PHOTO_TIMEOUT_MS);
    },
  };
}

async function ask<T>(url: string, init: RequestInit, timeoutMs: number): Promise<Answer<T>> {
  if (!navigator.onLine) return { kind: "cut" };
  try {
    const response = await fetch(url, {
      ...init,
      cache: "no-store",
      redirect: "error",
      signal: AbortSignal.timeout(timeoutMs),
    });
    if (response.ok) return { kind: "good", value: (await response.json()) as T };
    if (response.status === 401) return { kind: "signed-out" };
    if (!UNREADABLE.has(response.status)) return { kind: "cut" };
    return { kind: "refused", message: await messageOf(response) };
  } catch {
    return { kind: "cut" };
  }
}

async function messageOf(response: Response): Promise<string> {
  try {
    const { error } = (await response.json()) as { error?: { message?: string } };
    if (error?.message) return error.message;
  } catch {
    // Not ours: a proxy's page, for instance.
  }
  return `The server answered with ${response.status}.`;
}
