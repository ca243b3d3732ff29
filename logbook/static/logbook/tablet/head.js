// How one looks: typed once by each person for the round, and once for each part. Nothing is
// carried over to another person.

import { counterQuestions } from "./questions.js";
import { at } from "./state.js";
import { readMm } from "./sizes.js";
import { today, onDay } from "./words.js";
import { button, field, h, leaf } from "./ui.js";

const TOOLS = [
  ["method", "How you looked", "such as: eye, dye, magnetic particles, ultrasound", "Say how you looked."],
  ["procedure", "Procedure", "", "Say by which procedure."],
  ["procedure_revision", "Its revision", "", "Say which revision of it."],
  ["instrument", "Instrument", "its number; “none” if you used none", "Say with which instrument, or “none”."],
  ["calibration_valid_until", "Its calibration is valid until", "date", "Say until when its calibration is valid."],
  ["inspector_name", "Who looked", "", "Say who looked."],
  ["qualification_level", "Level of the qualification", "“none” if there is none", "Say which level, or none."],
  ["qualification_valid_until", "The qualification is valid until", "date", "Say until when the qualification is valid."],
];
const HERE = [
  ["surface", "Surface", "bare, painted, wet, dirty", "Say how the surface was: bare, painted, wet."],
  ["coverage", "How much of it you covered", "all of it, or which part", "Say how much was covered: all, or which part."],
];

const bare = (text) => (text ?? "").trim().toLowerCase();
// The eye needs no calibration, and someone without a level has no date of one.
const mayLack = (name, tools) =>
  (name === "calibration_valid_until" && ["none", "eye"].includes(bare(tools.instrument))) ||
  (name === "qualification_valid_until" && ["none", "no"].includes(bare(tools.qualification_level)));

// A clock that is behind must not stop anyone from writing: the server's own day counts too.
function latestDay() {
  const loaded = at.pack?.made_at.slice(0, 10) ?? "";
  return loaded > today() ? loaded : today();
}

export function complaints(tools, here, part) {
  const said = {};
  for (const [name, , , sentence] of [...TOOLS, ...HERE]) {
    const from = name in here ? here : tools;
    if (!bare(from[name]) && !mayLack(name, tools)) said[name] = sentence;
  }
  if (!here.found_on) said.found_on = "Say on which day you looked.";
  else if (!at.clock && here.found_on > latestDay()) said.found_on = `${onDay(here.found_on)} is in the future. Check the date.`;
  else if (part.last_found_on && here.found_on < part.last_found_on && !bare(here.late_why)) {
    said.late_why = `The last look here was on ${onDay(part.last_found_on)}. If this one really was earlier, say why it is written only now.`;
  }
  const counter = readMm(here.counter ?? "");
  if (!bare(here.counter)) said.counter = "Read the counter and write it here.";
  else if (!/^\d{1,9}([.,]\d{1,3})?$/.test(here.counter.trim())) said.counter = "This is not a number. Write it in digits, such as 8.4.";
  for (const question of counter ? counterQuestions(counter, part) : []) {
    if (question.kind === "back" && !bare(here.counter_replaced_why)) said.counter_replaced_why = question.sentence;
    if (question.kind === "jump" && !here.confirm_counter) said.confirm_counter = question.sentence;
  }
  return said;
}

export function headPage(act, part, tools, here, said = {}) {
  const box = (values, [name, label, hint]) => {
    const date = hint === "date";
    const input = h("input", { type: date ? "date" : "text", name, autocomplete: "off", value: values[name] ?? "" });
    input.addEventListener("input", () => (values[name] = input.value));
    return field(label, input, { note: date ? "" : hint, said: said[name] });
  };
  const day = h("input", { type: "date", name: "found_on", value: here.found_on ?? "" });
  day.addEventListener("input", () => (here.found_on = day.value));
  const toggle = h("input", { type: "checkbox", id: "confirm_counter", checked: here.confirm_counter === true });
  toggle.addEventListener("change", () => (here.confirm_counter = toggle.checked));
  return leaf(
    `Before you look: ${part.tag} · ${part.name}`,
    { kind: "single wide" },
    Object.keys(said).length > 0 && h("div", { class: "summary", role: "alert" }, h("p", {}, "Some of this does not fit yet. The rest is kept.")),
    h("h2", {}, "This part"),
    field("Day you looked", day, { said: said.found_on }),
    h("div", { class: "doing" }, button(`today, ${onDay(today())}`, () => (day.value = here.found_on = today()))),
    said.late_why && box(here, ["late_why", "Why it is written only now", ""]),
    box(here, ["counter", `Counter reading: ${part.counter_name}`, ""]),
    said.counter_replaced_why && box(here, ["counter_replaced_why", "Counter replaced or reset: what happened", ""]),
    said.confirm_counter && h("div", { class: "field wrong" }, h("span", { class: "said" }, said.confirm_counter), h("div", { class: "choice" }, toggle, h("label", { for: "confirm_counter" }, "this reading is right"))),
    HERE.map((one) => box(here, one)),
    box(here, ["fell_short", "What was not as the procedure asks", "surface, light, reach, coverage; leave it empty if all was"]),
    h("h2", {}, "You and your instrument, for the whole round"),
    TOOLS.map((one) => box(tools, one)),
    h("div", { class: "doing ends" }, h("a", { class: "button", href: `#/part/${part.id}` }, "Back"), button("Go to the places", act.headDone, "main")),
  );
}
