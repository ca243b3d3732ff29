// What waits, as one file: entries as they would be sent, photos beside them. The importer of the
// book takes it.

import * as store from "./store.js";
import { tablet } from "./send.js";
import { h } from "./ui.js";

const UNSENT = ["waiting", "photos", "refused", "tray"];

export async function waitingFile() {
  const items = (await store.all("outbox")).filter((item) => UNSENT.includes(item.state));
  const photos = [];
  for (const item of items) {
    for (const { sha256 } of item.photos ?? []) {
      const kept = await store.read("photos", [item.key, sha256]);
      if (kept) photos.push({ key: item.key, sha256, base64: await base64(kept.data) });
    }
  }
  const one = await tablet();
  return {
    waiting: 1,
    tablet: one.key,
    saved_at: new Date().toISOString(),
    items: items.map(({ key, kind, site, person, personName, body }) => ({ key, kind, site, person, person_name: personName, body })),
    photos,
  };
}

function base64(data) {
  return new Promise((resolve, reject) => {
    const reader = new FileReader();
    reader.onload = () => resolve(reader.result.slice(reader.result.indexOf(",") + 1));
    reader.onerror = () => reject(reader.error);
    reader.readAsDataURL(new Blob([data]));
  });
}

export async function exportWaiting() {
  const made = await waitingFile();
  if (!made.items.length) return false;
  const url = URL.createObjectURL(new Blob([JSON.stringify(made)], { type: "application/json" }));
  const link = h("a", { href: url, download: `waiting-${made.saved_at.slice(0, 16).replace(":", "-")}.json` });
  document.body.append(link);
  link.click();
  link.remove();
  setTimeout(() => URL.revokeObjectURL(url), 60000);
  return true;
}
