import assert from "node:assert/strict";
import test from "node:test";

import { counterQuestions, questions } from "../../logbook/static/logbook/tablet/questions.js";

const PLACE = { wall_mm: "22", longest_mm: "400" };
const CRACK = {
  last: { depth_mm: "3.1", length_mm: "14" },
  asks: {
    depth: { at_most_mm: "0.62", at_least_mm: "15.5", shrunk_below_mm: "1.685" },
    length: { at_most_mm: "2.8", at_least_mm: "70", shrunk_below_mm: "8.34" },
  },
};
const kinds = (depth_mm, length_mm, crack = CRACK) => questions({ depth_mm, length_mm }, PLACE, crack).map((one) => `${one.kind} ${one.name}`);

test("a likely size is not asked back", () => assert.deepEqual(kinds("3.4", "15"), []));
test("a slipped decimal point is asked back", () => {
  assert.deepEqual(kinds("15.5", "15"), ["slipped depth"]);
  assert.deepEqual(kinds("0.62", "15"), ["slipped depth", "smaller depth"]);
  assert.deepEqual(kinds("3.4", "140"), ["slipped length"]);
});
test("a smaller one wants a reason, within its error none", () => {
  assert.deepEqual(kinds("1.6", "15"), ["smaller depth"]);
  assert.deepEqual(kinds("1.685", "15"), []);
});
test("what cannot be in the wall is refused", () => {
  assert.deepEqual(kinds("44", "19", null), ["room depth"]);
  assert.deepEqual(kinds("4", "401", null), ["room length"]);
  assert.deepEqual(kinds("0", "19", null), ["room depth"]);
  assert.deepEqual(kinds("22", "400", null), []);
});
test("a counter that ran back or leapt", () => {
  const part = { last_counter: "1200", counter_asked_above: "13200" };
  assert.deepEqual(counterQuestions("1200", part), []);
  assert.equal(counterQuestions("1199.9", part)[0].kind, "back");
  assert.equal(counterQuestions("13201", part)[0].kind, "jump");
});
