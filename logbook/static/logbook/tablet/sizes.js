// Sizes as typed: exact decimals in text, inches turned into millimetres once. Nothing here is
// reckoned in floating point.

const PLAIN = /^(\d{1,6})(?:[.,](\d{1,3}))?$/;
const INCH_DECIMAL = /^(\d{1,4})?(?:[.,](\d{1,4}))?$/;
const INCH_FRACTION = /^(?:(\d{1,3})[ -])?(\d{1,3})\/(2|4|8|16|32|64)$/;

// "8,40" → "8.4"; null where it is no size.
export function readMm(typed) {
  const found = PLAIN.exec(typed.trim());
  return found ? tidy(`${found[1]}.${found[2] ?? ""}`) : null;
}

// 25.4 mm exactly; to a thousandth of a millimetre, a half upwards: the larger is the safer one.
export function readInch(typed) {
  const bare = typed.trim();
  const fraction = INCH_FRACTION.exec(bare);
  if (fraction) {
    const under = BigInt(fraction[3]);
    const over = BigInt(fraction[1] ?? 0) * under + BigInt(fraction[2]);
    return thousandths((over * 25400n * 2n + under) / (under * 2n));
  }
  const decimal = INCH_DECIMAL.exec(bare);
  if (!bare || !decimal || (!decimal[1] && !decimal[2])) return null;
  const tenThousandths = BigInt((decimal[1] ?? "0") + (decimal[2] ?? "").padEnd(4, "0"));
  return thousandths((tenThousandths * 25400n * 2n + 10000n) / 20000n);
}

function thousandths(n) {
  const text = n.toString().padStart(4, "0");
  return tidy(`${text.slice(0, -3)}.${text.slice(-3)}`);
}

function tidy(text) {
  const [whole, rest = ""] = text.split(".");
  const bare = whole.replace(/^0+(?=\d)/, "") || "0";
  const behind = rest.replace(/0+$/, "");
  return behind ? `${bare}.${behind}` : bare;
}

// -1, 0 or 1; both are decimals in text, not negative.
export function compare(a, b) {
  const [wa, ra = ""] = a.split(".");
  const [wb, rb = ""] = b.split(".");
  const long = Math.max(ra.length, rb.length);
  const [x, y] = [BigInt(wa + ra.padEnd(long, "0")), BigInt(wb + rb.padEnd(long, "0"))];
  return x < y ? -1 : x > y ? 1 : 0;
}

export const atLeast = (a, b) => compare(a, b) >= 0;
export const below = (a, b) => compare(a, b) < 0;

export const shown = (mm, sign = ".") => `${mm.replace(".", sign)}\u00a0mm`;
