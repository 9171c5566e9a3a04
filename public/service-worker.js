/*
 * Keeps the phone pages on the phone. Three caches:
 *   pages  the HTML of each phone page, with its own headers (its policy's nonce among them)
 *   parts  scripts, styles and fonts; their names hold a hash of their content
 *   extras the manifest and the icon
 * A page is kept only when all its parts are: a new version that arrived half stays unused, and the
 * old one goes on working, whether it is the pages or this worker that changed. Nothing under /api
 * is ever kept, and no page with a person's data: the phone pages are the same for everybody.
 *
 * It also sends what the phone keeps when the browser says that there is signal, page or no page.
 */
const VERSION = "2";
const PAGES = `wanewright-pages-${VERSION}`;
const PARTS = `wanewright-parts-${VERSION}`;
const EXTRAS = `wanewright-extras-${VERSION}`;
const OURS = [PAGES, PARTS, EXTRAS];

const FIELD_PAGES = ["/today", "/stop", "/log", "/swap", "/cannot", "/find", "/outbox"];
const EXTRA_FILES = ["/manifest.webmanifest", "/icon.svg"];
const PART = /\/_next\/static\/[^"'\\\s<>)]+/g;
/** Longer than this a page does not wait for a weak signal when it has a copy. */
const PATIENCE_MS = 1500;

self.addEventListener("install", () => {
  void self.skipWaiting();
});

// What an older worker kept stays until this one has kept everything itself.
self.addEventListener("activate", (event) => event.waitUntil(self.clients.claim()));

self.addEventListener("message", (event) => {
  const { act, parts } = event.data ?? {};
  if (act === "keep" && Array.isArray(parts)) event.waitUntil(keepShell(parts));
  if (act === "forget") event.waitUntil(forgetPages());
});

async function forgetPages() {
  const names = await caches.keys();
  const pages = names.filter((name) => name.startsWith("wanewright-pages-"));
  await Promise.all(pages.map((name) => caches.delete(name)));
}

/**
 * Keeps the pages as the server has them now, once every part is here: those the page says it has
 * loaded and those the HTML itself names. A page of an older build does not know the parts that the
 * new one loads later: its word is not enough to keep the new one by.
 */
async function keepShell(loaded) {
  const page = await fetchPage(FIELD_PAGES[0]);
  if (!page) return;
  const html = await page.clone().text();
  if (!ownScripts(html).every((path) => loaded.includes(path))) return;
  const named = html.match(PART) ?? [];
  const wanted = new Set([...loaded.filter((path) => path.startsWith("/_next/static/")), ...named]);
  await Promise.all([...wanted].map((path) => keepPart(path)));
  await caches.open(PAGES).then((cache) => cache.put(FIELD_PAGES[0], page));
  for (const path of FIELD_PAGES.slice(1)) await keepPage(path, wanted);
  const extras = await caches.open(EXTRAS);
  await Promise.all(EXTRA_FILES.map((path) => extras.add(path).catch(() => undefined)));
  await dropStaleParts(wanted);
  const names = await caches.keys();
  const old = names.filter((name) => name.startsWith("wanewright-") && !OURS.includes(name));
  await Promise.all(old.map((name) => caches.delete(name)));
}

/** The scripts that a page runs at once; those for old browsers are never loaded by this one. */
function ownScripts(html) {
  const tags = html.match(/<script\b[^>]*>/g) ?? [];
  return tags
    .filter((tag) => !/\bnomodule\b/i.test(tag))
    .flatMap((tag) => tag.match(/\bsrc="(\/_next\/static\/[^"]+)"/)?.[1] ?? []);
}

async function keepPage(path, wanted) {
  const page = await fetchPage(path);
  if (!page) return;
  const html = await page.clone().text();
  for (const part of html.match(PART) ?? []) {
    wanted.add(part);
    await keepPart(part);
  }
  const cache = await caches.open(PAGES);
  await cache.put(path, page);
}

/** A page of ours as it is; null for a redirect (signed out) and for any error. */
async function fetchPage(path) {
  const response = await fetch(path, { credentials: "same-origin", redirect: "manual" });
  return response.ok && response.type === "basic" ? response : null;
}

/** @throws when the part cannot be had: the page that needs it is not kept then */
async function keepPart(path) {
  const cache = await caches.open(PARTS);
  if (await cache.match(path)) return;
  const response = await fetch(path);
  if (!response.ok) throw new Error(`${path}: ${response.status}`);
  await cache.put(path, response);
}

/** Parts of versions that no kept page needs any more. */
async function dropStaleParts(wanted) {
  const cache = await caches.open(PARTS);
  for (const request of await cache.keys()) {
    if (!wanted.has(new URL(request.url).pathname)) await cache.delete(request);
  }
}

self.addEventListener("fetch", (event) => {
  const { request } = event;
  const url = new URL(request.url);
  if (request.method !== "GET" || url.origin !== self.location.origin) return;
  if (url.pathname.startsWith("/_next/static/")) event.respondWith(part(request));
  else if (EXTRA_FILES.includes(url.pathname)) event.respondWith(extra(request));
  else if (request.mode === "navigate" && FIELD_PAGES.includes(url.pathname)) {
    event.respondWith(page(request, url.pathname));
  }
});

/** A copy this worker kept, or one that an older worker left behind. */
async function copyOf(key, kind) {
  const options = { ignoreVary: true };
  const own = `wanewright-${kind}-${VERSION}`;
  const copy = await caches.match(key, { ...options, cacheName: own });
  if (copy) return copy;
  for (const name of await caches.keys()) {
    if (name === own || !name.startsWith(`wanewright-${kind}-`)) continue;
    const older = await caches.match(key, { ...options, cacheName: name });
    if (older) return older;
  }
  return undefined;
}

/** Parts never change under their name: the copy is as good as the original. */
async function part(request) {
  return (await copyOf(request, "parts")) ?? fetch(request);
}

async function extra(request) {
  return (await copyOf(new URL(request.url).pathname, "extras")) ?? fetch(request);
}

/** The server's page when it comes in time, the copy when it does not. */
async function page(request, path) {
  const copy = await copyOf(path, "pages");
  if (!copy) return fetch(request);
  if (self.navigator?.onLine === false) return copy;
  const patience = new Promise((resolve) => {
    setTimeout(() => resolve(null), PATIENCE_MS);
  });
  const fresh = fetch(request).catch(() => null);
  const first = await Promise.race([fresh, patience]);
  return first && first.status < 500 ? first : copy;
}

/* ---- Sending in the background ------------------------------------------------------------- */

const OUTBOX_TAG = "wanewright-outbox";
const STORE = "wanewright-field";
const ENTRIES_A_CALL = 20;

self.addEventListener("sync", (event) => {
  if (event.tag === OUTBOX_TAG) event.waitUntil(sendKept());
});

/**
 * Sends this person's entries in order, then their photos, unless a page is at it. It settles no
 * entry: the page asks again, and the server answers what became of each. So whatever is cut off
 * here is sent once more and counts once. A rejection makes the browser try again later.
 */
async function sendKept() {
  await self.navigator.locks.request(STORE, { ifAvailable: true }, async (lock) => {
    const db = lock && (await openStore());
    if (!db) return;
    try {
      const person = await read(db, "meta", (store) => store.get("person"));
      const device = await read(db, "meta", (store) => store.get("device"));
      if (!person || !device) return;
      const applied = await sendEntries(db, person.id, device);
      await sendPhotos(db, person.id, applied);
    } finally {
      db.close();
      new BroadcastChannel(STORE).postMessage("sent");
    }
  });
}

/** The store as the pages have made it; null where they have made none of the shape known here. */
function openStore() {
  return new Promise((resolve) => {
    const opening = indexedDB.open(STORE);
    opening.onupgradeneeded = () => opening.transaction.abort();
    opening.onerror = () => resolve(null);
    opening.onsuccess = () => {
      const db = opening.result;
      db.onversionchange = () => db.close();
      const known = ["entries", "meta", "photos", "pictures"];
      if (known.every((name) => db.objectStoreNames.contains(name))) return resolve(db);
      db.close();
      resolve(null);
    };
  });
}

function read(db, name, ask) {
  return new Promise((resolve, reject) => {
    const request = ask(db.transaction(name).objectStore(name));
    request.onsuccess = () => resolve(request.result);
    request.onerror = () => reject(request.error);
  });
}

/** @returns the ids the server has applied; stops where something must wait */
async function sendEntries(db, personId, deviceId) {
  const all = await read(db, "entries", (store) => store.getAll());
  const open = all
    .filter((entry) => entry.personId === personId)
    .filter((entry) => entry.state === "kept" || entry.state === "sending")
    .sort((a, b) => a.seq - b.seq);
  const done = all.filter((entry) => entry.state === "applied");
  const applied = new Set(done.map((entry) => entry.id));
  for (let n = 0; n < open.length; n += ENTRIES_A_CALL) {
    const entries = open
      .slice(n, n + ENTRIES_A_CALL)
      .map(({ id, happenedAt, mends = null, body }) => ({ id, happenedAt, personId, mends, body }));
    const response = await call("/api/sync", {
      method: "POST",
      headers: { "content-type": "application/json" },
      body: JSON.stringify({ deviceId, sentAt: new Date().toISOString(), entries }),
    });
    const { outcomes } = await response.json();
    for (const { id, outcome } of outcomes) if (outcome === "applied") applied.add(id);
    if (outcomes.some(({ outcome }) => outcome === "later")) break;
  }
  return applied;
}

async function sendPhotos(db, personId, applied) {
  const entries = await read(db, "entries", (store) => store.getAll());
  const kept = new Set(entries.map((entry) => entry.id));
  const photos = (await read(db, "photos", (store) => store.getAll()))
    .filter((photo) => photo.personId === personId && photo.refusal === null)
    .filter((photo) => applied.has(photo.entryId) || !kept.has(photo.entryId));
  for (const { id, entryId, takenAt, position } of photos) {
    const body = await read(db, "pictures", (store) => store.get(id));
    const sent = new Date().toISOString();
    const query = new URLSearchParams({ entry: entryId, person: personId, taken: takenAt, sent });
    if (position) {
      query.set("lat", position.latitude);
      query.set("lon", position.longitude);
    }
    const headers = { "content-type": "image/jpeg" };
    const url = `/api/sync/photos/${id}?${query}`;
    const response = await call(url, { method: "PUT", headers, body }, [400, 413, 422]);
    if (response.ok) await dropPhoto(db, id);
  }
}

/** @throws when it may pass later: the browser then wakes this worker again */
async function call(url, init, final = []) {
  const response = await fetch(url, { ...init, credentials: "same-origin", redirect: "error" });
  if (response.ok || final.includes(response.status)) return response;
  throw new Error(`${url.split("?")[0]}: ${response.status}`);
}

function dropPhoto(db, id) {
  return new Promise((resolve, reject) => {
    const work = db.transaction(["photos", "pictures"], "readwrite");
    work.objectStore("photos").delete(id);
    work.objectStore("pictures").delete(id);
    work.oncomplete = () => resolve();
    work.onabort = () => reject(work.error);
  });
}
