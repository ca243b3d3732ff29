// Served from the root as a module. VERSION and FILES stand above, put there by the server.
// The page and its files come from the store, so that they open with no signal; everything else
// goes to the server and is never kept.

import { sendAll } from "/static/logbook/tablet/send.js";

const KEPT = `logbook-page-${VERSION}`;
const PICTURES = "logbook-pictures";

self.addEventListener("install", (event) => {
  event.waitUntil(
    caches
      .open(KEPT)
      .then((cache) => cache.addAll(FILES.map((one) => new Request(one, { cache: "reload" }))))
      .then(() => self.skipWaiting()),
  );
});

self.addEventListener("activate", (event) => {
  event.waitUntil(
    caches
      .keys()
      .then((names) => names.filter((name) => name !== KEPT && name !== PICTURES))
      .then((old) => Promise.all(old.map((name) => caches.delete(name))))
      .then(() => self.clients.claim()),
  );
});

self.addEventListener("fetch", (event) => {
  const { request } = event;
  const url = new URL(request.url);
  if (request.method !== "GET" || url.origin !== self.location.origin) return;
  if (url.pathname === "/tablet/" || FILES.includes(url.pathname)) {
    event.respondWith(fromStore(url.pathname, request));
  } else if (/^\/photo\/\d+\/shown\/$/.test(url.pathname)) {
    event.respondWith(picture(request));
  } else if (request.mode === "navigate") {
    // No signal: the tablet's own page says so.
    event.respondWith(fetch(request).catch(() => fromStore("/tablet/", request)));
  }
});

async function fromStore(path, request) {
  const cache = await caches.open(KEPT);
  return (await cache.match(path)) ?? fetch(request);
}

async function picture(request) {
  try {
    return await fetch(request);
  } catch (gone) {
    const kept = await (await caches.open(PICTURES)).match(request.url);
    if (kept) return kept;
    throw gone;
  }
}

self.addEventListener("sync", (event) => {
  if (event.tag === "send") event.waitUntil(sendAll());
});
