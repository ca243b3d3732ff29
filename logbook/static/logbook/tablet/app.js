// The tablet's page: which leaf is open, and what each act does.

import { exportWaiting } from "./export.js";
import { complaints, headPage } from "./head.js";
import { placePage } from "./place.js";
import { close, index, partPage, round } from "./round.js";
import { partOf as onLabel, scan } from "./scan.js";
import { load, me, sendAll, Unsent, wipe } from "./send.js";
import { at, isWaiting, keep, note, part as partOf, place as placeOf, recall, refresh, witness } from "./state.js";
import { judge } from "./stop.js";
import * as store from "./store.js";
import { site, today, who } from "./today.js";
import { sending, sentences, written } from "./written.js";
import { atTime, counted, moment, today as localDay } from "./words.js";
import { h, leaf } from "./ui.js";

const main = document.getElementById("leaf");
const AGAIN = 30 * 1000;
let sites = [];

const act = {
  go(where) {
    if (location.hash === where) return show();
    location.hash = where;
    return undefined;
  },
  async load() {
    await online(async (session) => {
      sites = session.sites;
      const slug = at.site ?? (sites.length === 1 ? sites[0].slug : null);
      if (!slug) return act.go("#/site");
      const refused = await load(slug, session);
      await keep({ site: slug, ...(at.person ? {} : { person: await asPerson(slug, session) }) });
      at.said = refused?.title ?? "";
      await room();
      return show();
    });
  },
  async site(slug) {
    await keep({ site: slug, round: null });
    act.go("#/");
    await act.load();
  },
  async person(one) {
    await keep({ person: one });
    act.go("#/round");
  },
  look(one) {
    localStorage.setItem("look", one);
    document.documentElement.dataset.look = one;
    show();
  },
  async round(taken) {
    if (!at.person) return act.go("#/who");
    const where = location.hash;
    await keep({ round: taken ? { key: taken.key, begun: taken.begun } : { key: crypto.randomUUID(), begun: moment() } });
    return where === location.hash ? show() : undefined;
  },
  async putDown() {
    await keep({ round: null });
    show();
  },
  async headDone() {
    const { tools, here, part } = open.head;
    const said = complaints(tools, here, part);
    if (Object.keys(said).length) return put(headPage(act, part, tools, here, said));
    await store.put("heads", tools, toolsKey());
    await store.put("heads", here, hereKey(part));
    const first = part.locations[0];
    return act.go(open.head.then ?? (first ? `#/place/${first.id}` : `#/new/${part.id}`));
  },
  async write(part, place, draft, sizes) {
    const tools = await store.read("heads", toolsKey());
    const here = await store.read("heads", hereKey(part));
    const item = itemOf(part, place, draft, sizes, tools, here);
    await store.write(
      item,
      draft.photos.map((photo) => ({ key: item.key, sha256: photo.sha256, data: photo.data, type: photo.type })),
    );
    await refresh();
    act.go(`#/written/${item.key}`);
    void send();
  },
  async undo(item) {
    const done = await store.change(item.seq, (now) => now.state === "waiting" && !now.tried_at, { state: "undone", undone_at: moment() });
    await refresh();
    if (done) act.go("#/round");
    else show();
  },
  async stopNote(item, noted) {
    const key = crypto.randomUUID();
    const written_at = moment();
    await store.write({
      ...common(key, "stop-note", `${item.place}: tag and who was told`, written_at),
      body: { key, entry_key: item.key, written_at, ...noted },
    });
    await store.change(item.seq, () => true, { stopNote: noted });
    await refresh();
    show();
    void send();
  },
  async declare(counts) {
    const written_at = moment();
    await store.write({
      ...common(at.round.key, "round", "The end of the round", written_at),
      body: { key: at.round.key, site: at.site, written_at, ...counts },
    });
    await keep({ round: null });
    act.go("#/send");
    void send();
  },
  async scan(found, said) {
    await scan(document.getElementById("camera"), found, said);
  },
  send: () => send(true),
  // The server looks whether that is so, and puts them in the tray; else they go on waiting.
  async handIn() {
    for (const item of at.outbox.filter((one) => isWaiting(one) && one.person !== at.session.id)) {
      await store.change(item.seq, isWaiting, { handIn: true });
    }
    await send(true);
  },
  async exportFile() {
    if (await exportWaiting()) note({ exported: moment() });
  },
  async lostRead() {
    at.lost = null;
    show();
  },
};

const toolsKey = () => `${at.person.id}:${at.round?.key ?? "none"}`;
const hereKey = (part) => `${toolsKey()}:${part.id}`;

const common = (key, kind, place, written_at) => ({
  key,
  kind,
  state: "waiting",
  site: at.site,
  round: at.round?.key ?? null,
  person: at.person.id,
  personName: at.person.name,
  place,
  written_at,
});

function itemOf(part, place, draft, sizes, tools, here) {
  const key = crypto.randomUUID();
  const written_at = moment();
  const finding = {
    ...(place ? { location: place.id } : { new_location: { name: draft.new_name.trim(), described: draft.described.trim() } }),
    what: draft.what,
    ...(draft.what === "crack" || draft.what === "known-not-seen" ? { crack: draft.crack ? String(draft.crack.number) : "new" } : {}),
    ...Object.fromEntries(["why", "part_not_seen", "remarks", "why_smaller"].filter((name) => draft[name]?.trim()).map((name) => [name, draft[name].trim()])),
    ...(sizes ? { depth_basis: sizes.depth_basis, ...(sizes.depth_mm ? { depth_mm: sizes.depth_mm } : {}), ...(sizes.length_mm ? { length_mm: sizes.length_mm } : {}) } : {}),
    ...(draft.confirm ? { confirm_unlikely: true } : {}),
    photos: draft.photos.map((photo) => photo.sha256),
  };
  const stop = draft.what === "crack" ? (draft.crack ? draft.crack.stop : place?.stop_new) ?? null : null;
  const judged = sizes ? judge(sizes, stop, { today: localDay(), counter: here.counter.replace(",", "."), clock: at.clock }) : null;
  return {
    ...common(key, "entry", `${part.tag} · ${place ? place.name : draft.new_name.trim()}`, written_at),
    photos: draft.photos.map(({ sha256, data }) => ({ sha256, size: data.byteLength, arrived: false })),
    shown: { judged, stop, sentences: sentences(judged) },
    body: {
      entry: { key, component: part.id, written_at, ...tools, ...here, findings: [finding] },
      round: at.round?.key ?? null,
      shown: { ...(judged ?? { page: "no-verdict" }), stop, sentences: sentences(judged), loaded: at.pack.made_at, typed: sizes?.typed ?? {} },
      layers: Object.fromEntries(draft.photos.filter((photo) => photo.marks.length).map((photo) => [photo.sha256, photo.marks])),
      ...(draft.spot ? { spot: draft.spot } : {}),
    },
  };
}

async function asPerson(slug, session) {
  const pack = await store.read("packages", slug);
  return pack?.people.find((one) => one.id === session.person.id) ?? null;
}

// ---- sending ----

async function online(work) {
  try {
    const session = await me();
    at.session = session.person;
    at.signal = { ok: true };
    await work(session);
  } catch (gone) {
    if (!(gone instanceof Unsent)) throw gone;
    unsent(gone);
  }
}

function unsent(gone) {
  at.signal = { ok: false, why: gone.why, since: at.signal?.since ?? moment() };
  status();
  if (!busy()) show(false);
}

let sendingNow = false;
let onceMore = false;
async function send(asked = false) {
  if (sendingNow) {
    onceMore ||= asked;
    return;
  }
  sendingNow = true;
  try {
    const report = await sendAll(async () => {
      await refresh();
      status();
    });
    // Another tab or the worker sends: look again when it is through.
    if (report.busy) setTimeout(() => send(true), 500);
    if (report.person) {
      at.session = report.person;
      at.signal = { ok: true };
    }
    await refresh();
    await verdicts();
    status();
    if (asked || report.sent) if (!busy()) show(false);
  } catch (gone) {
    await refresh();
    if (!(gone instanceof Unsent)) throw gone;
    unsent(gone);
    await askWorker();
  } finally {
    sendingNow = false;
    if (onceMore) {
      onceMore = false;
      void send(true);
    }
  }
}

// Background sync where there is; the timer below everywhere.
async function askWorker() {
  const registration = await navigator.serviceWorker?.ready;
  await registration?.sync?.register("send").catch(() => {});
}

// Entries that are in the book and were answered "pending".
async function verdicts() {
  const { ask } = await import("./send.js");
  for (const item of at.outbox.filter((one) => one.answer?.pending && one.answer.entry_number).slice(-20)) {
    const { status: code, body } = await ask(`answer/${item.key}`);
    if (code === 200 && body.key === item.key) await store.change(item.seq, () => true, { answer: body });
  }
  await refresh();
}

// ---- leaves ----

const open = {};
// Somebody is writing: nothing is redrawn under their hands.
const busy = () =>
  /^#\/(place|new|head|close|index)/.test(location.hash) ||
  [...main.querySelectorAll("input, textarea")].some((one) => one.value || one === document.activeElement);

const routes = [
  [/^#\/round$/, "round", () => round(act)],
  [/^#\/index$/, "index", () => index(act)],
  [/^#\/part\/(\d+)$/, "index", (id) => partPage(act, id)],
  [/^#\/head\/(\d+)$/, "round", (id) => head(partOf(id), null)],
  [/^#\/place\/(\d+)$/, "round", (id) => atPlace(id)],
  [/^#\/new\/(\d+)$/, "round", (id) => whenReady(partOf(id), `#/new/${id}`, (part) => placePage(act, part, null))],
  [/^#\/written\/([0-9a-f-]+)$/, "round", (key) => written(act, at.outbox.find((one) => one.key === key))],
  [/^#\/send$/, "send", () => sending(act)],
  [/^#\/close$/, "round", () => close(act)],
  [/^#\/who$/, "today", () => who(act)],
  [/^#\/site$/, "today", () => site(act, sites)],
  [/./, "today", () => today(act)],
];

async function atPlace(id) {
  const { part, place } = placeOf(id);
  return whenReady(part, `#/place/${id}`, () => placePage(act, part, place));
}

// Who writes, in which round and how one looks are asked before anything is written.
async function whenReady(part, then, page) {
  if (!part) return leaf("This part is not on this tablet", {});
  if (!at.person) return who(act);
  if (!at.round) await keep({ round: { key: crypto.randomUUID(), begun: moment() } });
  const tools = await store.read("heads", toolsKey());
  const here = await store.read("heads", hereKey(part));
  if (!tools || !here || Object.keys(complaints(tools, here, part)).length) return head(part, then);
  return page(part);
}

async function head(part, then) {
  if (!part) return leaf("This part is not on this tablet", {});
  if (!at.person) return who(act);
  if (!at.round) await keep({ round: { key: crypto.randomUUID(), begun: moment() } });
  const tools = (await store.read("heads", toolsKey())) ?? {};
  const here = (await store.read("heads", hereKey(part))) ?? { surface: "", coverage: "", counter: "", found_on: "" };
  open.head = { tools, here, part, then };
  return headPage(act, part, tools, here);
}

let turn = 0;
async function show(moved = true) {
  const mine = (turn += 1);
  const hash = location.hash || "#/";
  const [pattern, tab, page] = routes.find(([one]) => one.test(hash)) ?? routes.at(-1);
  const made = await page(...(pattern.exec(hash)?.slice(1) ?? []));
  // Another leaf was opened meanwhile.
  if (mine === turn) put(made, moved, tab);
}

function put(made, moved = true, tab = "round") {
  main.replaceChildren(made);
  for (const one of document.querySelectorAll("[data-tab]")) {
    if (one.dataset.tab === tab) one.setAttribute("aria-current", "page");
    else one.removeAttribute("aria-current");
  }
  const title = made.querySelector("h1");
  document.title = `${title.textContent} · Crack logbook`;
  if (moved) {
    window.scrollTo(0, 0);
    (made.querySelector("[role=alert] h2, .summary[role=alert]") ?? title).focus?.({ preventScroll: true });
  }
  status();
}

function status() {
  const n = at.outbox.filter(isWaiting).length;
  document.getElementById("waits").replaceChildren(n ? `\u00a0(${n})` : "");
  document.getElementById("where").replaceChildren(h("li", {}, h("b", {}, at.pack?.site.name ?? "Crack logbook")));
  document.getElementById("hand").replaceChildren(`${atTime(Date.now())}${at.person ? ` · ${at.person.name}` : ""}`);
  const line = document.getElementById("state");
  const words = n ? `${counted(n, "entry", "entries")} on this tablet only` : "Nothing waits to be sent";
  const why = { "no-signal": "no signal", "no-answer": "the book did not answer", "sign-in": "sign in to send" }[at.signal?.why];
  const said = `${words}${at.signal && !at.signal.ok ? ` · ${why}` : ""}.`;
  if (line.textContent !== said) line.replaceChildren(said);
}

// ---- the store ----

async function room() {
  const { quota, usage } = (await navigator.storage?.estimate?.()) ?? {};
  const kept = await navigator.storage?.persisted?.();
  if (!quota) return;
  // A photo of a tablet's camera is about 4 MB.
  const photos = Math.floor((quota - usage) / 4e6);
  at.room = `Room left for about ${photos} photos. ${kept ? "The store is kept until you clear it." : "The browser may clear the store when room is short: send soon."}`;
}

async function wipeOld() {
  for (const pack of await store.all("packages")) {
    if (pack.keep_days && Date.now() - pack.loaded_at > pack.keep_days * 864e5) await wipe(pack.slug);
  }
}

async function start() {
  // Another page that could not be had without signal: of a part it is shown what is here.
  if (location.pathname !== "/tablet/") {
    const id = onLabel(location.pathname);
    history.replaceState(null, "", id ? `/tablet/#/part/${id}` : "/tablet/#/");
  }
  document.documentElement.dataset.look = localStorage.getItem("look") ?? "day";
  const before = witness();
  const id = await store.identity();
  if (id.fresh && before?.store) at.lost = { ...before };
  note({ store: id.key, ...(id.fresh ? { exported: null } : {}) });
  await wipeOld();
  await recall();
  await room();
  window.addEventListener("hashchange", () => show());
  window.addEventListener("online", () => send());
  document.addEventListener("visibilitychange", () => document.visibilityState === "visible" && send());
  setInterval(() => send(), AGAIN);
  await show();
  performance.mark("usable");
  document.documentElement.dataset.ready = "yes";
  if ("serviceWorker" in navigator) await navigator.serviceWorker.register("/worker.js", { type: "module", scope: "/" });
  await navigator.storage?.persist?.();
  await room();
  if (!at.pack) await act.load();
  else if (at.outbox.some(isWaiting)) await send();
  else await online(async (session) => (sites = session.sites));
}

start().catch((gone) => {
  main.replaceChildren(
    leaf("The store of this tablet does not open", { edge: "Nothing is written down here" }, h("p", {}, `Write on paper, and tell the engineer: ${gone?.name ?? ""} ${gone?.message ?? gone}.`)),
  );
});
