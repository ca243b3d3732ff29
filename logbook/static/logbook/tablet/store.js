// What is kept on the tablet. A write is done when its transaction has completed with strict
// durability, and not before: only then may a page say "written down".

const NAME = "logbook";
const FORM = 1;
let opened;

export function open() {
  opened ??= new Promise((resolve, reject) => {
    const asked = indexedDB.open(NAME, FORM);
    asked.onupgradeneeded = () => {
      const db = asked.result;
      db.createObjectStore("meta");
      db.createObjectStore("packages", { keyPath: "slug" });
      db.createObjectStore("heads");
      const outbox = db.createObjectStore("outbox", { keyPath: "seq", autoIncrement: true });
      outbox.createIndex("key", "key", { unique: true });
      db.createObjectStore("photos", { keyPath: ["key", "sha256"] });
    };
    asked.onsuccess = () => {
      const db = asked.result;
      db.onversionchange = () => db.close();
      db.onclose = () => (opened = undefined);
      resolve(db);
    };
    asked.onerror = () => {
      opened = undefined;
      reject(asked.error);
    };
  });
  return opened;
}

// Runs `work(stores)` in one transaction; resolves with what it gives once all of it is on disk.
async function within(names, mode, work) {
  const db = await open();
  return new Promise((resolve, reject) => {
    const t = db.transaction(names, mode, { durability: "strict" });
    let result;
    t.oncomplete = () => resolve(result);
    t.onabort = () => reject(t.error ?? new Error("The store took nothing of it."));
    t.onerror = () => {};
    const stores = Object.fromEntries(names.map((name) => [name, t.objectStore(name)]));
    work(stores, (value) => (result = value), t);
  });
}

export const read = (name, key) =>
  within([name], "readonly", (s, give) => {
    s[name].get(key).onsuccess = (e) => give(e.target.result);
  });

export const all = (name) =>
  within([name], "readonly", (s, give) => {
    s[name].getAll().onsuccess = (e) => give(e.target.result);
  });

export const put = (name, value, key) =>
  within([name], "readwrite", (s, give) => {
    s[name].put(value, key).onsuccess = (e) => give(e.target.result);
  });

export const remove = (name, key) => within([name], "readwrite", (s) => s[name].delete(key));

// An entry with its photos: all of it or nothing.
export const write = (item, photos = []) =>
  within(["outbox", "photos"], "readwrite", (s, give) => {
    s.outbox.add(item).onsuccess = (e) => give(e.target.result);
    for (const photo of photos) s.photos.put(photo);
  });

// Changes a waiting item only if `may(item)`; says whether it did. Two tabs cannot both.
export const change = (seq, may, to) =>
  within(["outbox"], "readwrite", (s, give) => {
    s.outbox.get(seq).onsuccess = (e) => {
      const item = e.target.result;
      const yes = item !== undefined && may(item);
      give(yes);
      if (yes) s.outbox.put({ ...item, ...to });
    };
  });

export const dropPhoto = (seq, key, sha256) =>
  within(["outbox", "photos"], "readwrite", (s) => {
    s.photos.delete([key, sha256]);
    s.outbox.get(seq).onsuccess = (e) => {
      const item = e.target.result;
      const photos = item.photos.map((p) => (p.sha256 === sha256 ? { ...p, arrived: true } : p));
      s.outbox.put({ ...item, photos });
    };
  });

// Made with the store, so that a store that was cleared is not taken for the old one.
export async function identity() {
  let id = await read("meta", "store");
  if (!id) {
    id = { key: crypto.randomUUID(), made_at: new Date().toISOString() };
    await put("meta", id, "store");
    return { ...id, fresh: true };
  }
  return { ...id, fresh: false };
}
