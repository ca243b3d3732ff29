// Every way in which a stop size is missing, stale or not to be compared with ends in stop.
import assert from "node:assert/strict";
import test from "node:test";

import { clockTrouble, judge } from "../../logbook/static/logbook/tablet/stop.js";

const STOP = { depth_mm: "7.4", length_mm: "30", basis_revision: 2, good_until_on: "2026-09-14", good_until_at: "14950" };
const NOW = { today: "2026-05-04", counter: "1200", clock: "" };
const size = (depth_mm, length_mm, depth_basis = "measured") => ({ depth_mm, length_mm, depth_basis });

test("at or beyond in depth or length alone is stop", () => {
  assert.equal(judge(size("7.4", "10"), STOP, NOW).page, "stop");
  assert.equal(judge(size("7.40", "10"), STOP, NOW).page, "stop");
  assert.equal(judge(size("2", "30"), STOP, NOW).page, "stop");
  assert.equal(judge(size("12", null, "at-least"), STOP, NOW).page, "stop");
  assert.equal(judge(size(null, "31", "not-measured"), STOP, NOW).page, "stop");
});

test("below in both is below, and no more than that", () => {
  assert.deepEqual(judge(size("7.399", "29.999"), STOP, NOW), { page: "below", why: "It is below the stop size." });
});

test("none, stale, or not to be compared: treat it as stop", () => {
  const small = size("1", "2");
  for (const [sizes, stop, now] of [
    [small, null, NOW],
    [small, STOP, { ...NOW, today: "2026-09-15" }],
    [small, STOP, { ...NOW, counter: "14950" }],
    [small, STOP, { ...NOW, counter: "" }],
    [small, STOP, { ...NOW, clock: "The clock of this tablet was put back." }],
    [size("1", null), STOP, NOW],
    [size(null, "2", "not-measured"), STOP, NOW],
    [size("1", "2", "at-least"), STOP, NOW],
  ]) {
    const said = judge(sizes, stop, now);
    assert.equal(said.page, "treat-as-stop");
    assert.match(said.why, /Treat it as stop\.$/);
  }
});

test("on the last good day it still holds", () => {
  assert.equal(judge(size("1", "2"), STOP, { ...NOW, today: "2026-09-14" }).page, "below");
});

test("a through crack is compared by its length alone", () => {
  const through = { ...STOP, depth_mm: null };
  assert.equal(judge(size(null, "29", "not-measured"), through, NOW).page, "below");
  assert.equal(judge(size(null, "30", "not-measured"), through, NOW).page, "stop");
});

test("a clock before the package or before itself is not trusted", () => {
  const made = "2026-05-04T09:00:00+02:00";
  const at = Date.parse(made);
  assert.equal(clockTrouble(at + 1000, made, at), "");
  assert.match(clockTrouble(at - 3600e3, made, 0), /before the round was loaded/);
  assert.match(clockTrouble(at + 3600e3, made, at + 7200e3), /was put back/);
});
