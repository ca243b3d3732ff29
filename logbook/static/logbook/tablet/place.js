// What do you see here? One answer at a time; the size on a keypad; the last size after the new one.

import { wall } from "./draw.js";
import { keypad } from "./keypad.js";
import { photoBox } from "./photos.js";
import { questions } from "./questions.js";
import { picture, standing } from "./round.js";
import { readInch, readMm, shown } from "./sizes.js";
import { at, seenAt } from "./state.js";
import { pointable } from "./touch.js";
import { onDay, sizeWords, WHAT } from "./words.js";
import { button, entered, field, h, leaf, s } from "./ui.js";

// place null: one that nobody listed.
export function placePage(act, part, place) {
  const draft = { what: "", crack: null, depth: "", length: "", basis: "", inch: false, photos: [], compared: false };
  const body = h("div", {});
  const draw = () => body.replaceChildren(...[asked(act, part, place, draft, draw)].flat(9).filter(Boolean));
  draw();
  return leaf(
    place ? `${place.number} · ${place.name}` : "A place that is not listed",
    { kind: "single wide", voice: `${part.tag} · ${part.name}` },
    place?.described && h("p", {}, entered(place.described)),
    place && before(place),
    body,
  );
}

function before(place) {
  const seen = seenAt(place.id);
  return seen.length > 0 && h("ul", {}, seen.map(({ item, finding }) => h("li", { class: "line pencil" }, "This round: ", entered(WHAT[finding.what]), ` · ${standing(item)}`)));
}

function asked(act, part, place, draft, draw) {
  if (!draft.what) return [!place && newPlace(part, draft), question(place, draft, draw)];
  return [
    h("p", { class: "question" }, chosen(draft)),
    !place && newPlace(part, draft),
    draft.what === "crack" && sizes(place, draft, draw),
    (draft.what === "could-not-look" || draft.what === "known-not-seen") && why(draft),
    draft.what === "nothing" && part_not_seen(draft),
    remarks(draft),
    photoBox(draft.photos, (sentence) => say(draft, sentence)),
    (draft.said ??= h("p", { role: "alert" })),
    h(
      "div",
      { class: "doing ends" },
      button("Undo", () => {
        for (const name of Object.keys(draft)) delete draft[name];
        Object.assign(draft, { what: "", crack: null, depth: "", length: "", basis: "", inch: false, photos: [], compared: false });
        draw();
      }),
      button("Write it down", () => write(act, part, place, draft, draw), "main"),
    ),
  ];
}

const say = (draft, ...what) => draft.said?.replaceChildren(...what);

function question(place, draft, draw) {
  const choose = (what, crack = null) => () => {
    Object.assign(draft, { what, crack });
    draw();
  };
  const known = place?.cracks ?? [];
  return [
    h("p", { class: "question" }, "What do you see here?"),
    known.map((crack) =>
      h("div", { class: "keys across" }, button(`crack ${crack.number}: measure it`, choose("crack", crack), "answer-key"), button(`crack ${crack.number}: not seen`, choose("known-not-seen", crack), "answer-key")),
    ),
    h(
      "div",
      { class: "keys across" },
      !known.length && button("nothing found", choose("nothing"), "answer-key"),
      button(known.length ? "another crack" : "a crack", choose("crack"), "answer-key"),
      button("could not look", choose("could-not-look"), "answer-key"),
    ),
  ];
}

function chosen({ what, crack }) {
  if (what === "crack") return crack ? `Crack ${crack.number}` : "A new crack";
  if (what === "known-not-seen") return `Crack ${crack.number} was not seen`;
  return { nothing: "Nothing found", "could-not-look": "Could not look" }[what];
}

function text(draft, name, label, note, tag = "textarea") {
  const box = h(tag, { name, ...(tag === "textarea" ? { rows: 2 } : { type: "text" }), value: draft[name] ?? "" });
  box.addEventListener("input", () => (draft[name] = box.value));
  return field(label, box, { note });
}

const why = (draft) =>
  text(draft, "why", draft.what === "could-not-look" ? "Why you could not look" : "Why the crack could not be seen", draft.what === "could-not-look" ? "scaffold, water, covered, no time" : "paint, dirt, the method, other");
const part_not_seen = (draft) => text(draft, "part_not_seen", "Part of the place that you did not see", "leave it empty if you saw all of it");
const remarks = (draft) => text(draft, "remarks", "Remarks", "");

function newPlace(part, draft) {
  const spot = part.picture && spotOn(part, draft);
  return [text(draft, "new_name", "A short name for the place", "", "input"), text(draft, "described", "Where on the part it is, so that others find it"), spot];
}

function spotOn(part, draft) {
  const inner = picture(part);
  const { box, overlay } = pointable(inner, "Picture of the part: touch where the place is", (x, y, over) => {
    draft.spot = [x, y];
    over.replaceChildren(s("path", { class: "layer", d: `M${x / 100 - 3} ${y / 100}H${x / 100 + 3}M${x / 100} ${y / 100 - 4}V${y / 100 + 4}` }));
  });
  if (draft.spot) overlay.replaceChildren(s("circle", { class: "layer", cx: draft.spot[0] / 100, cy: draft.spot[1] / 100, r: 3 }));
  return h("div", { class: "field" }, h("p", {}, "Touch the picture where the place is."), box);
}

// The sizes as they will be sent: {depth_mm, length_mm, depth_basis, typed, wrong}.
export function readSizes(draft) {
  const how = draft.inch ? readInch : readMm;
  const out = { depth_mm: null, length_mm: null, depth_basis: draft.basis, typed: {}, wrong: {} };
  for (const name of ["depth", "length"]) {
    const typed = draft[name].trim();
    if (!typed) continue;
    out[`${name}_mm`] = how(typed);
    if (draft.inch) out.typed[name] = `${typed} in`;
    if (out[`${name}_mm`] === null) out.wrong[name] = draft.inch ? `“${typed}” is no size in inches. Write 0.375 or 3/8.` : `“${typed}” is no size. Write it in digits, such as 8.4.`;
  }
  if (draft.basis === "not-measured") {
    out.depth_mm = null;
    delete out.typed.depth;
    delete out.wrong.depth;
    if (!out.length_mm && !out.wrong.length) out.wrong.length = "Type the length along the surface.";
  } else if (!out.depth_mm && !out.wrong.depth) {
    out.wrong.depth = "Type the depth, or choose “not measured”.";
  } else if (!draft.basis) {
    out.depth_basis = "measured";
  }
  return out;
}

function sizes(place, draft, draw) {
  const stop = draft.crack ? draft.crack.stop : place?.stop_new;
  const scale = wall(place, stop);
  const sign = at.person?.decimal_sign ?? ".";
  const both = h("p", { class: "note", "aria-live": "polite" });
  const show = () => {
    const now = readSizes(draft);
    scale.show(now);
    both.replaceChildren(...(draft.inch ? [["depth", "length"].filter((n) => now[`${n}_mm`]).map((n) => `${n} ${draft[n].trim()} in = ${shown(now[`${n}_mm`], sign)}`).join(" · ")] : []));
  };
  const box = (name, label) => {
    const input = h("input", { type: "text", inputmode: "none", autocomplete: "off", name, value: draft[name] });
    input.addEventListener("input", () => {
      draft[name] = input.value;
      draft.compared = false;
      show();
    });
    const made = field(label, input);
    made.classList.add("size");
    made.append(h("span", { class: "with-unit" }, input, h("span", { class: "unit" }, draft.inch ? "in" : "mm")));
    return { made, input };
  };
  const depth = box("depth", draft.basis === "at-least" ? "Depth, at least" : "Depth");
  const length = box("length", "Length along the surface");
  const measured = draft.basis !== "not-measured";
  const basis = (to) => () => {
    draft.basis = draft.basis === to ? "" : to;
    draft.compared = false;
    draw();
  };
  const extra = [
    [draft.basis === "at-least" ? "not “at least”" : "at least", basis("at-least")],
    [measured ? "not measured" : "depth measured", basis("not-measured")],
    ...(at.pack?.inches
      ? [[draft.inch ? "millimetres" : "inch", () => { draft.inch = !draft.inch; draft.compared = false; draw(); }]]
      : []),
    ...(draft.inch ? [["/", () => put("/")], ["space", () => put(" ")]] : []),
  ];
  let latest = measured ? depth.input : length.input;
  for (const one of [depth.input, length.input]) one.addEventListener("focus", () => (latest = one));
  const put = (mark) => {
    latest.value += mark;
    latest.dispatchEvent(new Event("input", { bubbles: true }));
  };
  show();
  const boxes = measured ? [depth.input, length.input] : [length.input];
  return [
    h(
      "div",
      { class: "sizing" },
      h("div", {}, h("div", { class: "pair-of-sizes" }, measured ? depth.made : h("p", {}, "Depth: not measured"), length.made), both, scale.box),
      keypad(boxes, sign, extra, () => compare(place, draft, draw)),
    ),
    draft.compared && lastSize(place, draft, draw),
  ];
}

// Only after the new size: the last one, and what is odd beside it.
function compare(place, draft, draw) {
  const now = readSizes(draft);
  const wrong = Object.values(now.wrong);
  if (wrong.length) {
    say(draft, wrong.join(" "));
    return false;
  }
  draft.compared = true;
  say(draft);
  draw();
  return true;
}

function lastSize(place, draft, draw) {
  const now = readSizes(draft);
  const sign = at.person?.decimal_sign ?? ".";
  const last = draft.crack?.last;
  const odd = questions(now, place, draft.crack, sign);
  const tick = h("input", { type: "checkbox", id: "right", checked: draft.confirm === true });
  tick.addEventListener("change", () => (draft.confirm = tick.checked));
  return h(
    "div",
    { class: "summary" },
    last && h("p", {}, `Last time, ${onDay(last.on)}: `, entered(sizeWords(last, sign))),
    h("p", {}, "Now: ", entered(sizeWords(now, sign))),
    odd.map((one) => h("p", { class: "odd" }, h("b", {}, one.sentence))),
    odd.some((one) => one.kind === "slipped") && h("div", { class: "choice" }, tick, h("label", { for: "right" }, "this size is right")),
    odd.some((one) => one.kind === "smaller") && text(draft, "why_smaller", "Why it is smaller", "other method, other place, ground out"),
  );
}

function missing(part, place, draft) {
  if (!place && !draft.new_name?.trim()) return "Give the place a short name.";
  if (!place && !draft.described?.trim()) return "Say where on the part it is, so that others find it.";
  if (!place && part.locations.some((one) => one.name.toLowerCase() === draft.new_name.trim().toLowerCase())) return "A place of this name is listed already: answer there.";
  if (draft.what === "could-not-look" && !draft.why?.trim()) return "Say why you could not look.";
  if (draft.what === "known-not-seen" && !draft.why?.trim()) return "Say why the crack could not be seen: paint, dirt, the method, other.";
  return "";
}

async function write(act, part, place, draft, draw) {
  const lacks = missing(part, place, draft);
  if (lacks) return say(draft, lacks);
  let now = null;
  if (draft.what === "crack") {
    if (!draft.compared) {
      if (!compare(place, draft, draw)) return undefined;
      if (draft.crack?.last || questions(readSizes(draft), place, draft.crack).length) {
        return say(draft, "Compare with the last size, then write it down.");
      }
    }
    now = readSizes(draft);
    for (const odd of questions(now, place, draft.crack)) {
      if (odd.kind === "room") return say(draft, odd.sentence);
      if (odd.kind === "slipped" && !draft.confirm) return say(draft, "Say that this size is right, or change it.");
      if (odd.kind === "smaller" && !draft.why_smaller?.trim()) return say(draft, "Say why it is smaller.");
    }
  }
  if (draft.writing) return undefined;
  draft.writing = true;
  try {
    await act.write(part, place, draft, now);
  } catch (fault) {
    const full = fault?.name === "QuotaExceededError";
    say(draft, h("b", {}, full ? "The store of this tablet is full. This is NOT written down: leave photos out, or send what waits." : `This is NOT written down: the tablet’s store did not take it (${fault?.name ?? "fault"}). Try again, or write it on paper.`));
  } finally {
    draft.writing = false;
  }
  return undefined;
}
