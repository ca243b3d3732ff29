// Sending what waits, in order. Used by the page and, where there is background sync, by the
// worker. One at a time on a tablet, however many tabs are open.
//
// Success is one thing only: JSON that echoes the key that was sent. Whatever else comes back, the
// item stays where it is and goes again; the server writes each key once.

import * as store from "./store.js";

const PIECE = 256 * 1024;
const API = "/api/v1/tablet/";

export class Unsent extends Error {
  // why: "no-signal", "sign-in", "no-answer"
  constructor(why, problem) {
    super(why);
    this.why = why;
    this.problem = problem;
  }
}

export async function ask(path, options = {}) {
  let answer;
  let body;
  try {
    answer = await fetch(API + path, {
      credentials: "same-origin",
      cache: "no-store",
      redirect: "error",
      signal: AbortSignal.timeout(30000),
      ...options,
    });
    // A reply that was cut short is no reply.
    body = await answer.json();
  } catch {
    throw new Unsent(answer ? "no-answer" : "no-signal");
  }
  if (answer.status === 401) throw new Unsent("sign-in");
  if (answer.status >= 500) throw new Unsent("no-answer");
  return { status: answer.status, body };
}

export async function me() {
  const { status, body } = await ask("me");
  if (status !== 200 || !body?.person?.id || !body.csrf) throw new Unsent("no-answer");
  return body;
}

const post = (path, csrf, body) =>
  ask(path, {
    method: "POST",
    headers: { "Content-Type": "application/json", "X-CSRFToken": csrf },
    body: JSON.stringify(body),
  });

// The tablet's own key and name, made once.
export async function tablet() {
  let one = await store.read("meta", "tablet");
  if (!one) {
    one = { key: crypto.randomUUID(), name: "" };
    await store.put("meta", one, "tablet");
  }
  return one;
}

export async function register(slug, csrf) {
  const one = await tablet();
  const name = one.name || `tablet ${one.key.slice(0, 4)}`;
  const { status, body } = await post(`${slug}/register`, csrf, { key: one.key, name });
  if (status === 409 && body.code === "tablet-revoked") return body;
  if (status !== 200 || body.key !== one.key) throw new Unsent("no-answer", body);
  return null;
}

const WAITS = (item) => item.state === "waiting" || item.state === "photos";

// Sends all that the person who is signed in wrote. Gives what happened, for the page to say.
export function sendAll(told = () => {}) {
  return navigator.locks.request("logbook-send", { ifAvailable: true }, async (lock) => {
    if (!lock) return { busy: true };
    const items = (await store.all("outbox")).filter(WAITS);
    if (!items.length) return { sent: 0, left: 0 };
    const session = await me();
    const report = { person: session.person, sent: 0, others: 0 };
    for (const [n, { seq }] of items.entries()) {
      const item = await store.read("outbox", seq);
      if (!item || !WAITS(item)) continue;
      if (item.person !== session.person.id && !item.handIn) {
        report.others += 1;
        continue;
      }
      if (item.state === "waiting") await sendOne(item, session, report, n + 1 < items.length);
      const now = await store.read("outbox", seq);
      if (now?.state === "photos") await sendPhotos(now, session);
      told(report);
    }
    report.left = (await store.all("outbox")).filter(WAITS).length;
    return report;
  });
}

// more: others wait behind it, and are not to wait for its verdict.
async function sendOne(item, session, report, more) {
  // From here on it may be in the book: it can be struck out, and no longer undone.
  const mine = await store.change(item.seq, WAITS, { tried_at: new Date().toISOString() });
  if (!mine) return;
  const one = await tablet();
  const sent = { ...item.body, person: item.person, tablet: one.key };
  const where = `${item.site}/send/${item.kind}${more ? "?more" : ""}`;
  let { status, body } = await post(where, session.csrf, sent);
  if (body.code === "tablet-unknown") {
    await register(item.site, session.csrf);
    ({ status, body } = await post(where, session.csrf, sent));
  }
  if (status === 403 && !body.key && /csrf/i.test(body.title ?? "")) throw new Unsent("no-answer");
  if ((status === 200 || status === 201) && body.key === item.key) {
    const photos = (item.photos ?? []).map((photo) => ({
      ...photo,
      id: body.photos?.[photo.sha256]?.id,
      arrived: body.photos?.[photo.sha256]?.arrived ?? false,
    }));
    const state = photos.some((photo) => !photo.arrived) ? "photos" : "sent";
    await store.change(item.seq, WAITS, { state, photos, answer: body, problem: null });
    report.sent += 1;
  } else if (status === 202 && body.key === item.key && body.problem) {
    await store.change(item.seq, WAITS, { state: "tray", answer: body, problem: body.problem });
    report.sent += 1;
  } else if (status === 409 && body.code === "other-person") {
    report.others += 1;
  } else if (status === 409 && body.code === "entry-not-here") {
    // Its entry went to the tray: the note stays with it here, for a person.
    await store.change(item.seq, WAITS, { state: "refused", problem: body });
  } else if (status >= 400 && body.code && body.title) {
    await store.change(item.seq, WAITS, { state: "refused", problem: body });
  } else {
    throw new Unsent("no-answer", body);
  }
}

async function sendPhotos(item, session) {
  for (const photo of item.photos.filter((one) => !one.arrived)) {
    const kept = await store.read("photos", [item.key, photo.sha256]);
    if (!kept || !photo.id) {
      await store.change(item.seq, WAITS, { state: "refused", problem: { code: "photo-gone", title: "A photo of this entry is no longer on the tablet.", fields: {} } });
      return;
    }
    const refused = await sendPhoto(photo, kept.data, session.csrf);
    if (refused) {
      await store.change(item.seq, WAITS, { state: "refused", problem: refused });
      return;
    }
    await store.dropPhoto(item.seq, item.key, photo.sha256);
  }
  await store.change(item.seq, WAITS, { state: "sent" });
}

// In pieces, from where the server stands. Gives a refusal, or nothing.
async function sendPhoto(photo, data, csrf) {
  const whole = data.byteLength;
  let { status, body } = await ask(`photo/${photo.id}`);
  for (let turns = 0; turns < 4 + whole / PIECE; turns += 1) {
    if (status >= 400 && status !== 409) return body;
    const here = body.photo === photo.id ? body.have : undefined;
    if (body.arrived && body.sha256 === photo.sha256) return null;
    const start = here ?? (await ask(`photo/${photo.id}`)).body.have;
    // All is there: the last piece again gives the answer that was missed.
    const from = Math.min(start, Math.max(whole - 1, 0));
    ({ status, body } = await ask(`photo/${photo.id}?start=${from}&whole=${whole}`, {
      method: "PUT",
      headers: { "Content-Type": "application/octet-stream", "X-CSRFToken": csrf },
      body: data.slice(from, from + PIECE),
    }));
  }
  throw new Unsent("no-answer", body);
}

// What the round needs, for one site. Gives the refusal of a revoked tablet after wiping.
export async function load(slug, session) {
  const revoked = await register(slug, session.csrf);
  if (revoked) {
    await wipe(slug);
    return revoked;
  }
  const one = await tablet();
  const waiting = (await store.all("outbox")).filter(WAITS).length;
  const { status, body } = await ask(`${slug}/package?tablet=${one.key}&waiting=${waiting}`);
  if (status === 409 && body.code === "tablet-revoked") {
    await wipe(slug);
    return body;
  }
  if (status !== 200 || body.package !== 1) throw new Unsent("no-answer", body);
  await store.put("packages", { slug, loaded_at: Date.now(), ...body });
  // The server's own time has just been heard: from here on the clock is watched anew.
  await store.put("meta", Date.now(), "latest");
  await keepPictures(body.components);
  return null;
}

// The data of a site and its pictures; never what waits.
export async function wipe(slug) {
  const pack = await store.read("packages", slug);
  const cache = await caches.open("logbook-pictures");
  for (const part of pack?.components ?? []) if (part.picture) await cache.delete(part.picture.url);
  await store.remove("packages", slug);
}

async function keepPictures(parts) {
  const cache = await caches.open("logbook-pictures");
  for (const part of parts) {
    if (!part.picture || (await cache.match(part.picture.url))) continue;
    const got = await fetch(part.picture.url, { credentials: "same-origin" }).catch(() => null);
    if (got?.ok) await cache.put(part.picture.url, got);
  }
}
