// The answer without signal. Never a verdict: a comparison of what was measured with the stop size
// that came with the round, and where that cannot be made, stop.

import { atLeast } from "./sizes.js";

export const PAGES = { STOP: "stop", TREAT: "treat-as-stop", BELOW: "below" };

// sizes: {depth_mm, length_mm, depth_basis}; stop: from the package, or null;
// now: {today, counter, clock}: clock is why the tablet's clock cannot be trusted, or "".
export function judge(sizes, stop, now) {
  if (!stop) return treat("No stop size here. Treat it as stop.");
  if (now.clock) return treat(`${now.clock} Treat it as stop.`);
  const stale = pastIts(stop, now);
  if (stale) return treat(`The stop size here was good until ${stale}. Treat it as stop.`);
  for (const name of ["depth", "length"]) {
    const [size, limit] = [sizes[`${name}_mm`], stop[`${name}_mm`]];
    if (size && limit && atLeast(size, limit)) {
      return { page: PAGES.STOP, why: `The ${name} is at or beyond the stop size.` };
    }
  }
  const missing = notCompared(sizes, stop);
  if (missing) return treat(`${missing} Treat it as stop.`);
  return { page: PAGES.BELOW, why: "It is below the stop size." };
}

const treat = (why) => ({ page: PAGES.TREAT, why });

function pastIts(stop, now) {
  const on = stop.good_until_on;
  if (on && now.today > on) return on;
  const at = stop.good_until_at;
  if (at && (!now.counter || atLeast(now.counter, at))) return `counter ${at}`;
  return "";
}

function notCompared(sizes, stop) {
  if (stop.depth_mm && sizes.depth_basis === "at-least") return "The depth is “at least”.";
  if (stop.depth_mm && !sizes.depth_mm) return "The depth is not measured.";
  if (stop.length_mm && !sizes.length_mm) return "The length is not measured.";
  return "";
}

// Why the clock cannot be trusted: it stands before the time of the server that made the package,
// or before a time that it showed itself.
export function clockTrouble(now, madeAt, latestSeen) {
  const slack = 10 * 60 * 1000;
  if (madeAt && now < Date.parse(madeAt) - slack) {
    return "The clock of this tablet stands before the round was loaded.";
  }
  if (latestSeen && now < latestSeen - slack) return "The clock of this tablet was put back.";
  return "";
}
