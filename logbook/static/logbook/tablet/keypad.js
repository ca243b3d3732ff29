// A keypad for gloves: large keys that write into the box that was touched last.

import { button, h } from "./ui.js";

// boxes: inputs in order; extra: [[words, act], …]; done: what "next" does after the last box.
export function keypad(boxes, sign, extra, done) {
  let active = boxes[0];
  const choose = (box) => {
    active = box;
    for (const one of boxes) one.closest(".size")?.classList.toggle("active", one === box);
  };
  for (const box of boxes) box.addEventListener("focus", () => choose(box));
  const type = (text) => {
    active.value += text;
    active.dispatchEvent(new Event("input", { bubbles: true }));
  };
  const rub = () => {
    active.value = active.value.slice(0, -1);
    active.dispatchEvent(new Event("input", { bubbles: true }));
  };
  const next = () => {
    const at = boxes.indexOf(active);
    active.dispatchEvent(new Event("change", { bubbles: true }));
    if (at + 1 < boxes.length) {
      choose(boxes[at + 1]);
      boxes[at + 1].focus({ preventScroll: true });
    } else {
      done();
    }
  };
  choose(active);
  const digits = ["7", "8", "9", "4", "5", "6", "1", "2", "3", sign, "0"];
  const key = (words, act, label) =>
    h("button", { type: "button", class: "digit", "aria-label": label, onclick: act }, words);
  return h(
    "div",
    { class: "keypad", role: "group", "aria-label": "Keypad" },
    h(
      "div",
      { class: "digits" },
      digits.map((one) => key(one, () => type(one), one === sign ? "decimal sign" : undefined)),
      key("rub out", rub),
    ),
    h("div", { class: "beside" }, extra.map(([words, act]) => button(words, act)), button("next", next)),
  );
}
