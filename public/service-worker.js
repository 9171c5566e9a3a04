/*
 * Keeps the phone pages on the phone. Three caches:
 *   pages  the HTML of each phone page, with its own headers (its policy's nonce among them)
 *   parts  scripts, styles and fonts; their names hold a hash of their content
 *   extras the manifest and the icon
 * A page is kept only when all its parts are: a new version that arrived half stays unused, and the
 * old one goes on working. Nothing under /api is ever kept, and no page with a person's data: the
 * phone pages are the same for everybody.
 */
const VERSION = "1";
const PAGES = `wanewright-pages-${VERSION}`;
const PARTS = `wanewright-parts-${VERSION}`;
const EXTRAS = `wanewright-extras-${VERSION}`;
const OURS = [PAGES, PARTS, EXTRAS];

const FIELD_PAGES = ["/today", "/stop", "/log", "/swap", "/cannot", "/find", "/outbox"];
const EXTRA_FILES = ["/manifest.webmanifest", "/icon.svg"];
/** Longer than this a page does not wait for a weak signal when it has a copy. */
const PATIENCE_MS = 1500;

self.addEventListener("install", () => {
  void self.skipWaiting();
});

self.addEventListener("activate", (event) => {
  event.waitUntil(
    (async () => {
      const names = await caches.keys();
      const old = names.filter((name) => name.startsWith("wanewright-") && !OURS.includes(name));
      await Promise.all(old.map((name) => caches.delete(name)));
      await self.clients.claim();
    })(),
  );
});

self.addEventListener("message", (event) => {
  const { act, parts } = event.data ?? {};
  if (act === "keep" && Array.isArray(parts)) event.waitUntil(keepShell(parts));
  if (act === "forget") event.waitUntil(caches.delete(PAGES));
});

/**
 * Keeps the pages as the server has them now, once every part is here: those the page says it has
 * loaded and those the HTML itself names.
 */
async function keepShell(loaded) {
  const page = await fetchPage(FIELD_PAGES[0]);
  if (!page) return;
  const html = await page.clone().text();
  const named = html.match(/\/_next\/static\/[^"'\\\s<>)]+/g) ?? [];
  const wanted = new Set([...loaded.filter((path) => path.startsWith("/_next/static/")), ...named]);
  await Promise.all([...wanted].map((path) => keepPart(path)));
  await caches.open(PAGES).then((cache) => cache.put(FIELD_PAGES[0], page));
  for (const path of FIELD_PAGES.slice(1)) await keepPage(path, wanted);
  const extras = await caches.open(EXTRAS);
  await Promise.all(EXTRA_FILES.map((path) => extras.add(path).catch(() => undefined)));
  await dropStaleParts(wanted);
}

async function keepPage(path, wanted) {
  const page = await fetchPage(path);
  if (!page) return;
  const html = await page.clone().text();
  for (const part of html.match(/\/_next\/static\/[^"'\\\s<>)]+/g) ?? []) {
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

/** Parts never change under their name: the copy is as good as the original. */
async function part(request) {
  return (await caches.match(request, { cacheName: PARTS, ignoreVary: true })) ?? fetch(request);
}

async function extra(request) {
  const path = new URL(request.url).pathname;
  const copy = await caches.match(path, { cacheName: EXTRAS, ignoreVary: true });
  return copy ?? fetch(request);
}

/** The server's page when it comes in time, the copy when it does not. */
async function page(request, path) {
  const copy = await caches.match(path, { cacheName: PAGES, ignoreVary: true });
  if (!copy) return fetch(request);
  const patience = new Promise((resolve) => {
    setTimeout(() => resolve(null), PATIENCE_MS);
  });
  const fresh = fetch(request).catch(() => null);
  const first = await Promise.race([fresh, patience]);
  return first && first.status < 500 ? first : copy;
}
