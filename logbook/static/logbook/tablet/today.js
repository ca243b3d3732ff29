// What is on this tablet, how old it is, what waits; the parts by date.

import { at, isWaiting, places } from "./state.js";
import { age, atTime, counted, onDay, today as localDay } from "./words.js";
import { button, entered, h, leaf, line, mark, to } from "./ui.js";

export function today(act) {
  const parts = [...(at.pack?.components ?? [])].sort((a, b) =>
    (a.standing?.due_on ?? "9").localeCompare(b.standing?.due_on ?? "9"),
  );
  return leaf(
    "On this tablet",
    { kind: "single wide" },
    at.lost && lostStore(act),
    at.said && h("div", { class: "summary", role: "alert" }, h("p", {}, at.said)),
    h("ul", { class: "held" }, heldLines().map((one) => line(...[one].flat()))),
    !at.pack && sites(act),
    at.pack && h("h2", {}, at.pack.site.name),
    at.pack && h("ol", {}, parts.map(dueLine)),
    at.pack &&
      h("div", { class: "doing" }, h("a", { class: "button main", href: "#/round" }, "Walk the round")),
    h(
      "div",
      { class: "doing" },
      button("Load the round again", act.load),
      to("another site", "#/site"),
      to("who writes", "#/who"),
    ),
    looks(act),
  );
}

// One honest line each: what is here, how old, what waits, what room is left.
export function heldLines() {
  const lines = [];
  if (at.pack) {
    const all = places();
    const cracks = all.reduce((n, { place }) => n + place.cracks.length, 0);
    const pictures = at.pack.components.filter((part) => part.picture).length;
    lines.push(
      `${counted(at.pack.components.length, "part")}, ${counted(all.length, "place")}, ${counted(cracks, "crack")}, ${counted(pictures, "picture")} of ${at.pack.site.name}.`,
      `As the book stood at ${atTime(at.pack.made_at)}: ${age(Date.now() - at.pack.loaded_at)}.`,
    );
    if (at.clock) lines.push(h("b", {}, `${at.clock} Every stop size here is treated as stop.`));
  } else {
    lines.push("No round is on this tablet.");
  }
  const waiting = at.outbox.filter(isWaiting);
  const photos = waiting.flatMap((item) => item.photos ?? []).filter((one) => !one.arrived).length;
  lines.push(
    waiting.length
      ? `${counted(waiting.length, "entry", "entries")} and ${counted(photos, "photo")} wait to be sent.`
      : "Nothing waits to be sent.",
  );
  if (at.signal && !at.signal.ok) lines.push(signalWords());
  if (at.room) lines.push(at.room);
  return lines;
}

export function signalWords() {
  const since = at.signal.since ? ` since ${at.signal.since.slice(11, 16)}` : "";
  const n = at.outbox.filter(isWaiting).length;
  const waits = n ? ` ${counted(n, "entry", "entries")} ${n === 1 ? "is" : "are"} on this tablet only.` : "";
  return {
    "no-signal": `No signal${since}.${waits} They go by themselves; keep it charged.`,
    "no-answer": `The book did not answer.${waits} The next try comes by itself.`,
    "sign-in": `Signed out${since}. Writing goes on; sending waits for a sign-in.${waits}`,
  }[at.signal.why];
}

function lostStore(act) {
  const { waiting, seen, exported } = at.lost;
  const file = exported ? `Load the file of ${atTime(exported)}, or write` : "Write";
  return h(
    "div",
    { class: "summary", role: "alert" },
    h("h2", {}, "This tablet cleared its store"),
    h(
      "p",
      {},
      waiting
        ? `It was whole at ${atTime(seen)}. ${counted(waiting, "entry", "entries")} had not been sent. ${file} them again from memory and say so.`
        : `It was whole at ${atTime(seen)}, and nothing waited to be sent.`,
    ),
    button("I have read this", act.lostRead),
  );
}

function dueLine(part) {
  const now = part.standing;
  const past = now?.due_on && now.due_on < localDay();
  return h(
    "li",
    { class: `line due${now?.held || past ? " out-of-use" : ""}${now?.signed && !past ? " signed" : ""}` },
    h("span", { class: "when" }, now?.due_on ? h("b", {}, onDay(now.due_on)) : h("span", { class: "note" }, "no date")),
    h(
      "span",
      { class: "body" },
      to(`${part.tag} · ${part.name}`, `#/part/${part.id}`),
      h("span", { class: "sub" }, past ? "Its time is up. Not to be used until it has been looked at." : (now?.sentence ?? "Nobody has looked at this part.")),
    ),
    now &&
      h(
        "span",
        { class: "verdict-word" },
        mark(at.pack.marks[past ? "refer" : now.verdict]),
        h("span", {}, h("b", {}, past ? "refer" : now.word), h("span", { class: "note sub" }, past ? "past its date" : now.state)),
      ),
  );
}



function sites(act) {
  return [
    h("p", {}, "With signal, sign in once and load the round. From then on it opens without."),
    h("div", { class: "doing" }, h("a", { class: "button", href: "/sign-in/?next=/tablet/" }, "Sign in"), button("Load the round", act.load)),
  ];
}

function looks(act) {
  return h(
    "div",
    { class: "looks" },
    h("span", {}, "This tablet reads by"),
    ["day", "lamp", "sun"].map((one) =>
      h("button", { type: "button", "aria-pressed": String(document.documentElement.dataset.look === one), onclick: () => act.look(one) }, one),
    ),
  );
}

export function who(act) {
  const people = at.pack?.people ?? [];
  return leaf(
    "Who writes?",
    { voice: "Each person’s entries go at that person’s own sign-in, and never as another’s." },
    h("p", {}, at.person ? ["Now: ", entered(at.person.name)] : "Nobody is chosen."),
    people.length
      ? h("div", { class: "keys large" }, people.map((one) => button(one.name, () => act.person(one), "choice-key")))
      : h("p", {}, "The people of the site come with the round. Load it first."),
  );
}

export function site(act, sites) {
  return leaf(
    "Which site?",
    {},
    sites.length
      ? h("div", { class: "keys large" }, sites.map((one) => button(one.name, () => act.site(one.slug), "choice-key")))
      : h("p", {}, "The sites you may see come with a sign-in. There is no signal, or nobody is signed in."),
    h("div", { class: "doing" }, h("a", { class: "button", href: "/sign-in/?next=/tablet/" }, "Sign in")),
  );
}

