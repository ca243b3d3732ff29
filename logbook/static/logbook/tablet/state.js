// What is at hand: who writes, which site, which round; and what came with the round.

import * as store from "./store.js";
import { clockTrouble } from "./stop.js";
import { moment } from "./words.js";

export const at = {
  person: null, // {id, name, decimal_sign}
  site: null, // its slug
  round: null, // {key, begun, seen: [from the book]}
  pack: null, // the package of the site
  outbox: [],
  signal: null, // {ok, since, why}
  lost: null,
  clock: "",
};

const FIELDS = ["person", "site", "round"];

export async function recall() {
  Object.assign(at, (await store.read("meta", "hand")) ?? {});
  await refresh();
}

export async function keep(change) {
  Object.assign(at, change);
  await store.put("meta", Object.fromEntries(FIELDS.map((name) => [name, at[name]])), "hand");
  await refresh();
}

export async function refresh() {
  at.outbox = await store.all("outbox");
  at.pack = at.site ? ((await store.read("packages", at.site)) ?? null) : null;
  const latest = (await store.read("meta", "latest")) ?? 0;
  const now = Date.now();
  at.clock = clockTrouble(now, at.pack?.made_at, latest);
  if (now > latest) await store.put("meta", now, "latest");
  note();
}

// A second witness: it says what was here, if the store itself is cleared.
export function note(more = {}) {
  const before = witness() ?? {};
  const waiting = at.outbox.filter((one) => one.state === "waiting" || one.state === "photos").length;
  localStorage.setItem("logbook", JSON.stringify({ ...before, waiting, seen: moment(), ...more }));
}

export function witness() {
  try {
    return JSON.parse(localStorage.getItem("logbook") ?? "null");
  } catch {
    return null;
  }
}

export const part = (id) => at.pack?.components.find((one) => one.id === Number(id));

export function place(id) {
  for (const one of at.pack?.components ?? []) {
    const found = one.locations.find((place) => place.id === Number(id));
    if (found) return { part: one, place: found };
  }
  return {};
}

// Every place in walking order.
export const places = () =>
  (at.pack?.components ?? []).flatMap((part) => part.locations.map((place) => ({ part, place })));

export const isWaiting = (item) => item.state === "waiting" || item.state === "photos";

// What this round has seen at a place: on this tablet, and in the book from any tablet.
export function seenAt(locationId) {
  const here = at.outbox.filter(
    (item) =>
      item.kind === "entry" &&
      item.round === at.round?.key &&
      item.state !== "undone" &&
      item.body.entry.findings[0].location === locationId,
  );
  const keys = new Set(here.map((item) => item.key));
  const there = (at.pack?.rounds.find((one) => one.key === at.round?.key)?.seen ?? []).filter(
    (one) => one.location === locationId && !keys.has(one.key),
  );
  return [
    ...here.map((item) => ({ item, finding: item.body.entry.findings[0] })),
    ...there.map((finding) => ({ item: null, finding })),
  ];
}
