// A point on a picture: one touch sets it, another moves it, arrow keys do the same.

import { h, s } from "./ui.js";

// picture: an element; ratio: its height over its width; set(x, y) in ten-thousandths.
export function pointable(picture, label, set, start = null) {
  let at = start;
  const cross = s("svg", { viewBox: "0 0 100 100", preserveAspectRatio: "none", "aria-hidden": "true" });
  const box = h("div", { class: "picture touch", tabindex: "0", role: "application", "aria-label": label }, picture, cross);
  const move = (x, y) => {
    at = [clip(x), clip(y)];
    set(...at, cross);
  };
  box.addEventListener("click", (event) => {
    const size = box.getBoundingClientRect();
    move(((event.clientX - size.left) / size.width) * 10000, ((event.clientY - size.top) / size.height) * 10000);
  });
  box.addEventListener("keydown", (event) => {
    const step = { ArrowLeft: [-400, 0], ArrowRight: [400, 0], ArrowUp: [0, -400], ArrowDown: [0, 400] }[event.key];
    if (!step) return;
    event.preventDefault();
    const [x, y] = at ?? [5000, 5000];
    move(x + step[0], y + step[1]);
  });
  return { box, overlay: cross, move };
}

const clip = (n) => Math.round(Math.min(Math.max(n, 0), 10000));

export function shape([kind, x1, y1, x2, y2]) {
  const n = (value) => value / 100;
  if (kind === "circle") {
    return s("ellipse", { class: "layer", cx: n(x1), cy: n(y1), rx: Math.abs(n(x2 - x1)), ry: Math.abs(n(y2 - y1)) });
  }
  // The head of the arrow is at the first point.
  return s("path", { class: "layer", d: `M${n(x2)} ${n(y2)}L${n(x1)} ${n(y1)}M${n(x1)} ${n(y1) - 6}V${n(y1)}H${n(x1) - 6}` });
}
