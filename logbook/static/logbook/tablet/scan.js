// The printed label by the camera, where the browser can read one; elsewhere the number is typed.

import { button, h } from "./ui.js";

// The last piece of the address on a label is the component's number in the book.
export const tagOf = (text) => {
  const found = /\/tablet\/#\/index\?tag=([^&]+)$/.exec(text);
  return found ? decodeURIComponent(found[1]) : text;
};

export async function scan(box, found, said) {
  let stream;
  try {
    stream = await navigator.mediaDevices.getUserMedia({ video: { facingMode: "environment" } });
  } catch {
    said.replaceChildren("The camera is not to be had. Type the number.");
    return;
  }
  const video = h("video", { autoplay: true, playsinline: true, muted: true });
  video.srcObject = stream;
  let going = true;
  const end = () => {
    going = false;
    for (const track of stream.getTracks()) track.stop();
    box.replaceChildren();
  };
  box.replaceChildren(video, button("Stop the camera", end));
  await video.play();
  const reader = new BarcodeDetector({ formats: ["qr_code"] });
  while (going) {
    const [code] = await reader.detect(video).catch(() => []);
    if (code) {
      end();
      found(tagOf(code.rawValue));
    } else {
      await new Promise((resolve) => setTimeout(resolve, 200));
    }
  }
}
