// Making pages out of elements: no text is ever read as markup.

const SVG = "http://www.w3.org/2000/svg";

export function h(tag, attributes = {}, ...children) {
  return fill(document.createElement(tag), attributes, children);
}

export function s(tag, attributes = {}, ...children) {
  return fill(document.createElementNS(SVG, tag), attributes, children);
}

function fill(made, attributes, children) {
  for (const [name, value] of Object.entries(attributes)) {
    if (value === null || value === undefined || value === false) continue;
    if (name.startsWith("on")) made.addEventListener(name.slice(2), value);
    else if (name === "value" || name === "checked") made[name] = value;
    else made.setAttribute(name, value === true ? "" : value);
  }
  made.append(...children.flat(3).filter((one) => one !== null && one !== undefined && one !== false && one !== ""));
  return made;
}

// The verdict marks come from the server as our own drawings, never from people.
export function mark(svg) {
  const parsed = new DOMParser().parseFromString(svg.replace("<svg ", `<svg xmlns="${SVG}" `), "image/svg+xml");
  return document.importNode(parsed.documentElement, true);
}

export const entered = (text) => h("span", { class: "entered" }, h("span", { class: "hidden" }, "entered: "), text);

let serial = 0;
export function field(label, box, { note, said } = {}) {
  box.id ||= `box-${(serial += 1)}`;
  const beside = `${box.id}-said`;
  box.setAttribute("aria-describedby", beside);
  return h(
    "div",
    { class: said ? "field wrong" : "field" },
    h("label", { for: box.id }, label),
    h("span", { id: beside }, note && h("span", { class: "note" }, note), said && h("span", { class: "said" }, said)),
    box,
  );
}

export const button = (words, act, kind = "") =>
  h("button", { type: "button", class: kind, onclick: act }, words);

export const to = (words, where) => h("a", { class: "to", href: where }, words);

export const line = (...what) => h("li", { class: "line" }, ...what);

export function leaf(title, { edge, kind = "single", voice } = {}, ...children) {
  return h(
    "article",
    { class: `leaf ${kind}${edge ? " edged" : ""}` },
    edge && h("p", { class: "edge-words" }, edge),
    h("div", { class: "title" }, h("h1", { tabindex: "-1" }, title)),
    h("div", { class: "page" }, voice && h("p", { class: "voice" }, voice), ...children),
  );
}
