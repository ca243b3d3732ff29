// What is asked back at once, as the server would later. The bounds came with the round: here they
// are only compared with.

import { atLeast, below, compare, shown } from "./sizes.js";

// sizes: {depth_mm, length_mm}; place: {wall_mm, longest_mm}; crack: {asks, last} or null.
// Each question: kind "room" (it cannot be), "slipped" (tick that it is right), "smaller" (why).
export function questions(sizes, place, crack, sign = ".") {
  const asked = [];
  const room = { depth: place?.wall_mm, length: place?.longest_mm };
  for (const name of ["depth", "length"]) {
    const size = sizes[`${name}_mm`];
    if (!size) continue;
    if (compare(size, "0") === 0) {
      asked.push({ kind: "room", name, sentence: "A crack has a size above 0." });
      continue;
    }
    if (room[name] && compare(size, room[name]) > 0) {
      const than = name === "depth" ? "deeper than the wall" : "longer than the part is wide here";
      asked.push({
        kind: "room",
        name,
        sentence: `${shown(size, sign)} is ${than} (${shown(room[name], sign)}). Check the decimal point, or ask the engineer to correct it.`,
      });
    }
    const limits = crack?.asks?.[name];
    const last = crack?.last?.[`${name}_mm`];
    if (!limits || !last) continue;
    if (atLeast(size, limits.at_least_mm) || compare(size, limits.at_most_mm) <= 0) {
      asked.push({
        kind: "slipped",
        name,
        sentence: `Last time the ${name} was ${shown(last, sign)}, and now ${shown(size, sign)}. Check the decimal point.`,
      });
    }
    if (below(size, limits.shrunk_below_mm)) {
      asked.push({
        kind: "smaller",
        name,
        sentence: `Last time the ${name} was ${shown(last, sign)}; a crack does not shrink. Say why it is smaller now.`,
      });
    }
  }
  return asked;
}

// The counter of the part: {last_counter, counter_asked_above}.
export function counterQuestions(counter, part) {
  if (!counter || !part.last_counter) return [];
  if (below(counter, part.last_counter)) {
    return [
      {
        kind: "back",
        sentence: `The counter stood at ${part.last_counter} at the last look; it cannot run back. If it was replaced or reset, say so.`,
      },
    ];
  }
  if (part.counter_asked_above && compare(counter, part.counter_asked_above) > 0) {
    return [
      {
        kind: "jump",
        sentence: `The counter stood at ${part.last_counter} at the last look, and now ${counter}. Check the digits.`,
      },
    ];
  }
  return [];
}
