// After an entry: that it is written down, and the answer. With signal the verdict; without, no
// verdict, and what the stop size says.

import { at, isWaiting } from "./state.js";
import { standing } from "./round.js";
import { atTime, onDay } from "./words.js";
import { button, field, h, leaf, line, mark, to } from "./ui.js";

export const SAID = {
  none: "No verdict yet.",
  below: "Below the stop size is not permission to use the part.",
  hold: "Do not return it to service before the verdict has come.",
  stop: "Stop: do not use it. Hang the tag, and call.",
};

// The sentences as they are shown; they are stored with the entry, word for word.
export function sentences(judged) {
  if (!judged) return [SAID.none, SAID.hold];
  if (judged.page === "below") return [SAID.none, judged.why, SAID.below, SAID.hold];
  return [SAID.none, judged.why, SAID.stop];
}

export function written(act, item) {
  if (!item) return leaf("This entry is not on this tablet", {}, h("div", { class: "doing" }, to("the round", "#/round")));
  const verdicts = item.answer?.verdicts ?? [];
  const answered = verdicts.length > 0 && !item.answer.pending;
  const judged = item.shown?.judged;
  const stops = !answered && judged && judged.page !== "below";
  const turned = !answered && judged?.page === "treat-as-stop";
  return leaf(
    answered ? "The verdict" : "Written down",
    { kind: `single wide${turned ? " turned" : ""}`, edge: stops ? "Stop" : verdicts.some((one) => one.held) ? "Out of use" : null, voice: item.place },
    h("p", { class: "hand" }, `${standing(item)}.`),
    answered ? verdicts.map(verdict) : item.kind === "entry" && noVerdict(item, judged),
    item.state === "tray" && problem(item),
    item.state === "refused" && problem(item),
    stops && stopForm(act, item),
    h(
      "div",
      { class: "doing ends" },
      item.state === "waiting" && !item.tried_at && button("Undo: take it back", () => act.undo(item)),
      item.answer?.findings && !isWaiting(item) && h("a", { class: "to", href: `/finding/${item.answer.findings[0]}/strike-out/` }, "strike it out"),
      h("a", { class: "button main", href: "#/round" }, "Next place"),
    ),
  );
}

const verdict = (one) =>
  h(
    "div",
    { class: "answer" },
    at.pack && mark(at.pack.marks[one.verdict]),
    h("div", {}, h("p", { class: "word" }, one.word), h("p", { class: "sentence" }, one.held && ["continue", "watch"].includes(one.verdict) ? `Not to be used until it is signed. Then: ${one.sentence}` : one.sentence), h("p", { class: "state" }, "proposed")),
  );

function noVerdict(item, judged) {
  const stop = item.shown?.stop;
  return [
    h("div", { class: "stop-words" }, (item.shown?.sentences ?? sentences(null)).map((one, n) => h("p", { class: n === 0 ? "word" : "sentence" }, one))),
    stop && h("p", {}, `Stop size here: ${[stop.depth_mm && `${stop.depth_mm} mm deep`, stop.length_mm && `${stop.length_mm} mm long`].filter(Boolean).join(" or ")}. Basis revision ${stop.basis_revision}, good until ${[stop.good_until_on && onDay(stop.good_until_on), stop.good_until_at && `counter ${stop.good_until_at}`].filter(Boolean).join(" or ")}.`),
    judged && at.pack && h("ul", {}, at.pack.site.on_call.map((one) => h("li", { class: "line pair" }, h("span", {}, `On call: ${one.name}`), h("a", { class: "to", href: `tel:${one.phone.replace(/[^+\d]/g, "")}` }, one.phone)))),
  ];
}

function problem(item) {
  const fields = Object.values(item.problem?.fields ?? {}).flat();
  return h(
    "div",
    { class: "summary", role: "alert" },
    h("h2", {}, item.state === "tray" ? "It is kept in the tray: a person decides" : "The book did not take it"),
    h("p", {}, item.problem?.title),
    h("ul", {}, fields.map((one) => h("li", {}, one))),
  );
}

function stopForm(act, item) {
  if (item.stopNote) {
    const note = item.stopNote;
    return h("ul", {}, line(`Tag ${note.tag_number || "not hung"}`), line(`Told: ${note.told_whom || "nobody yet"}${note.told_when ? `, ${note.told_when}` : ""}`));
  }
  const [tag, whom, when] = ["tag", "whom", "when"].map((name) => h("input", { type: "text", name, autocomplete: "off" }));
  const said = h("p", { role: "alert" });
  return [
    h("h2", {}, "What was done"),
    field("Number of the tag", tag),
    field("Whom you told", whom),
    field("When you told them", when),
    h("div", { class: "doing" }, button(`now, ${atTime(Date.now()).split(", ")[1]}`, () => (when.value = atTime(Date.now())))),
    said,
    button("Note this with the entry", async () => {
      if (!tag.value.trim() && !whom.value.trim()) said.replaceChildren("Write the number of the tag, or whom you told.");
      else if (whom.value.trim() && !when.value.trim()) said.replaceChildren("Say when you told them.");
      else await act.stopNote(item, { tag_number: tag.value.trim(), told_whom: whom.value.trim(), told_when: when.value.trim() });
    }),
  ];
}

export function sending(act) {
  const shown = at.outbox.filter((item) => item.state !== "undone").reverse();
  const waiting = shown.filter(isWaiting);
  const others = waiting.filter((item) => item.person !== at.session?.id && at.session);
  return leaf(
    "To send",
    { kind: "single wide" },
    h("p", { role: "status" }, waiting.length ? `${waiting.length} on this tablet only. They go by themselves, oldest first.` : "Nothing waits to be sent."),
    at.signal?.why === "sign-in" && h("div", { class: "doing" }, h("a", { class: "button main", href: "/sign-in/?next=/tablet/" }, "Sign in to send")),
    others.length > 0 && [
      h("p", {}, `${others.length} of these were written by someone else and wait for their own sign-in.`),
      h("div", { class: "doing" }, button("They have no role here any more: hand them in", act.handIn)),
    ],
    h("div", { class: "doing" }, button("Send now", act.send), button("Save what waits to a file", act.exportFile), to("who writes", "#/who")),
    h(
      "ol",
      {},
      shown.map((item) =>
        h(
          "li",
          { class: `line${isWaiting(item) ? " pencil" : ""}` },
          to(item.place, `#/written/${item.key}`),
          h("span", { class: "sub" }, `${item.personName} · ${atTime(item.written_at)} · ${standing(item)}`),
          item.problem && h("span", { class: "sub" }, h("b", {}, item.problem.title)),
        ),
      ),
    ),
  );
}
