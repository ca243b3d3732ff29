// Sizes are exact decimals in text. Factor of the inch: 25.4 mm exactly (international yard and
// pound agreement, 1 July 1959; ISO 31-1:1992, annex A).
import assert from "node:assert/strict";
import test from "node:test";

import { atLeast, below, compare, readInch, readMm } from "../../logbook/static/logbook/tablet/sizes.js";

test("millimetres as typed, with point or comma", () => {
  for (const [typed, read] of [["8.4", "8.4"], ["8,40", "8.4"], ["0", "0"], ["012", "12"], [" 7 ", "7"], ["1.125", "1.125"]]) {
    assert.equal(readMm(typed), read);
  }
});

test("what is no size is none", () => {
  for (const typed of ["", ".", "8.4.1", "1,000.5", "8.1234", "-3", "3e2", "NaN", "٣", "12345678"]) {
    assert.equal(readMm(typed), null, typed);
  }
});

test("inches by the exact factor, once, a half upwards", () => {
  for (const [typed, mm] of [["1", "25.4"], ["3/8", "9.525"], ["1 1/2", "38.1"], ["0.375", "9.525"], ["1/64", "0.397"], ["3/64", "1.191"], ["0,001", "0.025"], ["0.0001", "0.003"], ["2-1/4", "57.15"]]) {
    assert.equal(readInch(typed), mm, typed);
  }
  for (const typed of ["", "1/3", "1/0", "a", ".", "3//8", "1.23456"]) assert.equal(readInch(typed), null, typed);
});

test("every sixty-fourth against whole-number arithmetic", () => {
  for (let n = 1; n < 640; n += 1) {
    // 25.4 mm · n / 64 in thousandths: 25400·n/64, rounded half up.
    const want = Math.floor((25400 * n * 2 + 64) / 128);
    assert.equal(Math.round(Number(readInch(`${n}/64`)) * 1000), want, `${n}/64`);
  }
});

test("comparing is exact where floating point is not", () => {
  assert.equal(compare("0.3", "0.30"), 0);
  assert.equal(compare("10", "9.999"), 1);
  assert.equal(compare("900719925474099.3", "900719925474099.2"), 1);
  assert.ok(atLeast("7.4", "7.4"));
  assert.ok(!below("7.4", "7.4"));
  assert.ok(below("7.399", "7.4"));
});
