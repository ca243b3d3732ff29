// The size as it is typed, drawn to scale in the wall: this side at the bottom, the far side at the
// top, the stop size as a dashed line.

import { h, s } from "./ui.js";

const HIGH = 160;
const WIDE = 320;

export function wall(place, stop) {
  const box = h("div", { class: "wall" });
  return { box, show: (sizes) => box.replaceChildren(...drawn(place, stop, sizes)) };
}

function drawn(place, stop, { depth_mm: depth, length_mm: length }) {
  if (!place?.wall_mm) {
    return [h("p", { class: "note" }, "The wall here is not on this tablet, so nothing is drawn to scale.")];
  }
  const scale = HIGH / Number(place.wall_mm);
  const deep = Math.min(Number(depth || 0) * scale, HIGH);
  const long = Math.min(length ? Number(length) * scale : deep, WIDE - 20);
  const limit = stop?.depth_mm ? HIGH - Number(stop.depth_mm) * scale : null;
  const words = [
    `wall ${place.wall_mm} mm`,
    depth ? `crack ${depth} mm deep` : null,
    stop?.depth_mm ? `stop from ${stop.depth_mm} mm` : "no stop size here",
  ].filter(Boolean);
  const mid = WIDE / 2;
  return [
    s(
      "svg",
      { viewBox: `-4 -8 ${WIDE + 8} ${HIGH + 16}`, role: "img", "aria-label": words.join(", ") },
      s("path", { class: "wall-edge", d: `M0 0H${WIDE}M0 ${HIGH}H${WIDE}` }),
      deep > 0 &&
        s("path", {
          class: "wall-crack",
          d: `M${mid - long / 2} ${HIGH}Q${mid - long / 2} ${HIGH - deep} ${mid} ${HIGH - deep}Q${mid + long / 2} ${HIGH - deep} ${mid + long / 2} ${HIGH}Z`,
        }),
      limit !== null && s("path", { class: "wall-stop", d: `M0 ${limit}H${WIDE}` }),
    ),
    h("p", { class: "note" }, `${words.join(" · ")}. This side below, the far side above.`),
  ];
}
