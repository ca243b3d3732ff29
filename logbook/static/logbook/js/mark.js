// The picture as large as the leaf allows; the server is told the width that was touched.
const form = document.getElementById("mark");
if (form) {
  const picture = form.querySelector("input[type=image]");
  const width = form.elements.namedItem("width");
  const ratio = Number(picture.getAttribute("height")) / Number(picture.getAttribute("width"));
  const fit = () => {
    const room = Math.floor(form.getBoundingClientRect().width);
    picture.setAttribute("width", String(room));
    picture.setAttribute("height", String(Math.round(room * ratio)));
    width.value = String(room);
  };
  fit();
  window.addEventListener("resize", fit);
}
