// The round: one line a place in walking order; what was skipped gathers at the end; its last line
// closes the round.

import { partOf as onLabel } from "./scan.js";
import { at, isWaiting, part as partOf, places, seenAt } from "./state.js";
import { counted, onDay, today, WHAT } from "./words.js";
import { button, entered, field, h, leaf, line, mark, s, to } from "./ui.js";

export function round(act) {
  if (!at.pack) return noRound();
  if (!at.round) return begin(act);
  const all = places();
  const seen = all.filter(({ place }) => seenAt(place.id).length);
  const left = all.filter(({ place }) => !seenAt(place.id).length);
  const last = lastSeen(all);
  const skipped = left.filter((one) => all.indexOf(one) < last);
  const ahead = left.filter((one) => all.indexOf(one) >= last);
  return leaf(
    `Place ${Math.min(seen.length + 1, all.length)} of ${all.length}`,
    { kind: "single wide", voice: `Round begun ${onDay(at.round.begun)}` },
    h("ol", {}, [...seen, ...ahead].sort((a, b) => all.indexOf(a) - all.indexOf(b)).map(placeLine)),
    skipped.length > 0 && [h("h2", {}, "Not reached so far"), h("ol", {}, skipped.map(placeLine))],
    h("div", { class: "doing" }, to("a place that is not listed", "#/index")),
    h("div", { class: "doing ends" }, button("Put the round down", act.putDown), h("a", { class: "button", href: "#/close" }, "Close the round")),
  );
}

const lastSeen = (all) => all.findLastIndex(({ place }) => seenAt(place.id).length);

const noRound = () =>
  leaf("No round is on this tablet", {}, h("p", {}, "It is loaded once with signal, and then opens without."), h("div", { class: "doing" }, to("what is on this tablet", "#/")));

function begin(act) {
  const open = at.pack.rounds;
  return leaf(
    "The round",
    { kind: "single" },
    h("p", {}, `${counted(places().length, "place")} of ${at.pack.site.name} in walking order.`),
    h("div", { class: "doing" }, button("Begin a round", () => act.round(null), "main")),
    open.length > 0 && [
      h("h2", {}, "Begun, and not declared"),
      h(
        "ul",
        {},
        open.map((one) =>
          h("li", { class: "line pair" }, h("span", {}, entered(one.by), h("span", { class: "sub note" }, `begun ${onDay(one.begun)}, ${counted(new Set(one.seen.map((s) => s.location)).size, "place")} seen`)), button("Take it up", () => act.round(one))),
        ),
      ),
    ],
  );
}

function placeLine({ part, place }) {
  const seen = seenAt(place.id);
  const pencil = seen.some(({ item }) => item && isWaiting(item));
  return h(
    "li",
    { class: `line${pencil ? " pencil" : ""}` },
    to(`${place.number} · ${place.name}`, `#/place/${place.id}`),
    h("span", { class: "sub" }, `${part.tag} · ${part.name}${place.cracks.length ? ` · ${counted(place.cracks.length, "known crack")}` : ""}`),
    seen.map(({ item, finding }) => h("span", { class: "sub" }, entered(WHAT[finding.what]), ` · ${standing(item)}`)),
  );
}

export function standing(item) {
  if (!item) return "in the book";
  return {
    waiting: item.tried_at ? "on this tablet, being sent" : "on this tablet only",
    photos: `in the book, entry ${item.answer?.entry_number}; photos still go`,
    sent: `in the book, entry ${item.answer?.entry_number}`,
    tray: "in the tray: a person decides",
    refused: "not taken: see To send",
    undone: "taken back before it was sent",
  }[item.state];
}

export function index(act) {
  if (!at.pack) return noRound();
  const number = h("input", { type: "text", autocomplete: "off", autocapitalize: "characters" });
  const said = h("p", { role: "status" });
  const find = (text) => {
    const bare = text.trim().toLowerCase();
    const found = partOf(onLabel(bare)) ?? at.pack.components.find((one) => one.tag.toLowerCase() === bare);
    if (found) act.go(`#/part/${found.id}`);
    else said.replaceChildren(`No part ${text.trim() || "without a number"} is on this tablet.`);
  };
  return leaf(
    "Which part?",
    { kind: "single wide" },
    h(
      "form",
      {
        onsubmit: (event) => {
          event.preventDefault();
          find(number.value);
        },
      },
      field("The number on the part", number),
      said,
      h("div", { class: "doing" }, "BarcodeDetector" in window && button("Scan the label", () => act.scan(find, said)), h("button", { class: "main" }, "Find it")),
    ),
    h("div", { id: "camera" }),
    h("ul", {}, at.pack.components.map((one) => line(to(`${one.tag} · ${one.name}`, `#/part/${one.id}`), h("span", { class: "sub" }, counted(one.locations.length, "place"))))),
  );
}

export function partPage(act, id) {
  const part = partOf(id);
  if (!part) return noRound();
  const now = part.standing;
  const past = now?.due_on && now.due_on < today();
  const word = past ? "refer" : now?.verdict;
  return leaf(
    `${part.tag} · ${part.name}`,
    { kind: "single wide", voice: "In force, as this tablet knows it", edge: past || now?.held ? "Out of use" : null },
    now
      ? h(
          "div",
          { class: "answer" },
          mark(at.pack.marks[word]),
          h(
            "div",
            {},
            h("p", { class: "word" }, past ? "refer" : now.word),
            h("p", { class: "sentence" }, past ? `Its time was up on ${onDay(now.due_on)}. Not to be used until it has been looked at.` : now.sentence),
            h("p", { class: "state" }, `${past ? "past its date" : now.state} · because of ${now.because}`),
          ),
        )
      : h("p", {}, "Nothing stands here yet: nobody has looked at this part."),
    h("p", { class: "note" }, `As the book stood on ${onDay(at.pack.made_at)}. What came since is not on this tablet.`),
    h("div", { class: "doing" }, h("a", { class: "button main", href: `#/head/${part.id}` }, "Inspect")),
    part.picture && picture(part),
    h("h2", {}, "Place by place"),
    h("ol", {}, part.locations.map((place) => placeOf(part, place))),
    h("div", { class: "doing" }, to("a place that is not listed", `#/new/${part.id}`)),
  );
}

function placeOf(part, place) {
  return line(
    to(`${place.number} · ${place.name}${place.provisional ? " · provisional" : ""}`, `#/place/${place.id}`),
    place.cracks.map((crack) => h("span", { class: "sub" }, `crack ${crack.number}: `, crack.standing?.sentence ?? "No verdict yet.")),
    !place.cracks.length && h("span", { class: "sub" }, place.standing?.sentence ?? "never looked at"),
    h("span", { class: "sub" }, seenAt(place.id).map(({ item, finding }) => [entered(WHAT[finding.what]), ` · ${standing(item)} `])),
  );
}

export function picture(part, more = []) {
  const spots = part.locations.filter((place) => place.x !== null);
  return h(
    "div",
    { class: "picture" },
    h("img", { src: part.picture.url, width: part.picture.width, height: part.picture.height, alt: `${part.name} with its places marked by number` }),
    s(
      "svg",
      { viewBox: `0 0 1000 ${(1000 * part.picture.height) / part.picture.width}`, "aria-hidden": "true" },
      spots.map((place) => {
        const [x, y] = [place.x * 1000, (place.y * 1000 * part.picture.height) / part.picture.width];
        return [
          s("circle", { class: "spot-plate", cx: x, cy: y, r: 24, "stroke-width": 10 }),
          s("circle", { class: "spot", cx: x, cy: y, r: 24, "stroke-width": 4 }),
          s("text", { class: "spot-number", x, y: y + 12, "text-anchor": "middle", "font-size": 34, "stroke-width": 6 }, String(place.number)),
        ];
      }),
    ),
    ...more,
  );
}

export function close(act) {
  if (!at.round) return noRound();
  const all = places();
  const seen = all.filter(({ place }) => seenAt(place.id).length);
  const notSent = at.outbox.filter((item) => item.round === at.round.key && isWaiting(item)).length;
  const why = h("textarea", { rows: 2 });
  const said = h("p", { role: "alert" });
  const missing = all.length - seen.length;
  return leaf(
    "The end of the round",
    {},
    h(
      "ul",
      {},
      h("li", { class: "line pair" }, h("span", {}, "seen"), h("b", { class: "value" }, String(seen.length))),
      h("li", { class: "line pair" }, h("span", {}, "not reached"), h("b", { class: "value" }, String(missing))),
      h("li", { class: "line pair" }, h("span", {}, "written and not sent yet"), h("b", { class: "value" }, String(notSent))),
    ),
    missing > 0 && [h("ol", {}, all.filter((one) => !seen.includes(one)).map(placeLine)), field("Why these places were not reached", why)],
    said,
    h("p", {}, "I declare that this is what I saw on this round, and what I did not reach."),
    h(
      "div",
      { class: "doing ends" },
      h("a", { class: "button", href: "#/round" }, "Back"),
      button(
        "Declare the round",
        () => {
          if (missing && !why.value.trim()) said.replaceChildren("Say why these places were not reached.");
          else act.declare({ seen: seen.length, not_reached: missing, why_not: why.value.trim() });
        },
        "main",
      ),
    ),
  );
}

