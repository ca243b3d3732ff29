// Photos of an entry: the untouched bytes with their SHA-256, and what is drawn over them apart.

import { pointable, shape } from "./touch.js";
import { button, h } from "./ui.js";

const LARGEST = 20 * 1024 * 1024;

export async function digest(data) {
  const hash = new Uint8Array(await crypto.subtle.digest("SHA-256", data));
  return [...hash].map((byte) => byte.toString(16).padStart(2, "0")).join("");
}

// kept: list of {sha256, data, marks}; told(sentence) says what was not taken.
export function photoBox(kept, told) {
  const list = h("div", { class: "taken" });
  const input = h("input", { type: "file", accept: "image/jpeg,image/png,image/webp", capture: "environment", multiple: true, id: "photos" });
  const show = () => list.replaceChildren(...kept.map((photo, n) => one(photo, n, kept, show)));
  input.addEventListener("change", async () => {
    for (const file of input.files) {
      if (file.size > LARGEST) {
        told(`${file.name} is larger than 20 MB and was not taken.`);
        continue;
      }
      const data = await file.arrayBuffer();
      const sha256 = await digest(data);
      if (!kept.some((photo) => photo.sha256 === sha256)) kept.push({ sha256, data, type: file.type, marks: [] });
    }
    input.value = "";
    show();
  });
  show();
  return h("div", { class: "field" }, h("label", { for: "photos" }, "Photos"), h("span", { class: "note" }, "An arrow or a circle is laid over the photo; its own bytes stay untouched."), input, list);
}

function one(photo, n, kept, show) {
  const canvas = h("canvas", { role: "img", "aria-label": `photo ${n + 1}` });
  drawPhoto(canvas, photo);
  let kind = "arrow";
  const set = (x, y, overlay) => {
    const aside = kind === "arrow" ? [Math.max(x - 1800, 0), Math.max(y - 1800, 0)] : [x + 900, y + 1200];
    photo.marks = [[kind, x, y, Math.min(aside[0], 10000), Math.min(aside[1], 10000)]];
    overlay.replaceChildren(...photo.marks.map(shape));
  };
  const { box, overlay } = pointable(canvas, `Photo ${n + 1}: touch where the mark goes`, set);
  overlay.replaceChildren(...photo.marks.map(shape));
  const choose = (to) => () => {
    kind = to;
    const [last] = photo.marks;
    if (last) set(last[1], last[2], overlay);
  };
  return h(
    "figure",
    {},
    box,
    h(
      "div",
      { class: "doing" },
      button("arrow", choose("arrow")),
      button("circle", choose("circle")),
      button("rub out the mark", () => {
        photo.marks = [];
        overlay.replaceChildren();
      }),
      button("leave this photo out", () => {
        kept.splice(kept.indexOf(photo), 1);
        show();
      }),
    ),
  );
}

async function drawPhoto(canvas, photo) {
  try {
    const picture = await createImageBitmap(new Blob([photo.data], { type: photo.type }), { resizeWidth: 800 });
    canvas.width = picture.width;
    canvas.height = picture.height;
    canvas.getContext("2d").drawImage(picture, 0, 0);
  } catch {
    canvas.width = 800;
    canvas.height = 60;
    canvas.replaceWith(h("p", { class: "note" }, "This photo cannot be shown here. Its bytes are kept."));
  }
}
