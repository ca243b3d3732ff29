// Dates, times and ages in words; the times that are kept, with their offset.

const day = new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "short", year: "numeric" });
const NBSP = "\u00a0";

export const onDay = (iso) => day.format(new Date(`${iso.slice(0, 10)}T12:00:00`)).replaceAll(" ", NBSP);

// The tablet's own day and moment: 2026-05-04 and 2026-05-04T09:55:00+02:00.
export function today(at = new Date()) {
  return `${at.getFullYear()}-${two(at.getMonth() + 1)}-${two(at.getDate())}`;
}

export function moment(at = new Date()) {
  const off = -at.getTimezoneOffset();
  const sign = off < 0 ? "-" : "+";
  const away = Math.abs(off);
  return `${today(at)}T${two(at.getHours())}:${two(at.getMinutes())}:${two(at.getSeconds())}${sign}${two(Math.floor(away / 60))}:${two(away % 60)}`;
}

const two = (n) => String(n).padStart(2, "0");

export function atTime(when) {
  const iso = moment(new Date(when));
  return `${onDay(iso)}, ${iso.slice(11, 16)}${NBSP}${iso.slice(19)}`;
}

export function age(ms) {
  const minutes = Math.floor(ms / 60000);
  if (minutes < 0) return "from a time still to come";
  if (minutes < 2) return "just now";
  if (minutes < 120) return `${minutes} minutes old`;
  if (minutes < 2880) return `${Math.floor(minutes / 60)} hours old`;
  return `${Math.floor(minutes / 1440)} days old`;
}

export const counted = (n, one, many = `${one}s`) => `${n}${NBSP}${n === 1 ? one : many}`;

export const WHAT = {
  nothing: "nothing found",
  "could-not-look": "could not look",
  "known-not-seen": "known crack not seen",
  crack: "a crack",
};

export function sizeWords(finding, sign = ".") {
  const mm = (value) => `${value.replace(".", sign)}${NBSP}mm`;
  const deep =
    finding.depth_basis === "not-measured" || !finding.depth_mm
      ? "depth not measured"
      : `${finding.depth_basis === "at-least" ? "at least " : ""}${mm(finding.depth_mm)} deep`;
  return finding.length_mm ? `${deep}, ${mm(finding.length_mm)} long` : deep;
}
