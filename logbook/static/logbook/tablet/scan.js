// The printed label by the camera, where the browser can read one; elsewhere the number is typed.

import { button, h } from "./ui.js";

// A label holds the address of its part; anything else is read as a number on the part.
export const partOf = (text) => /\/component\/(\d+)\/?$/.exec(text)?.[1] ?? null;

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
      found(code.rawValue);
    } else {
      await new Promise((resolve) => setTimeout(resolve, 200));
    }
  }
}
