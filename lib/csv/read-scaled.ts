/** Which sign parts the whole from the fraction; "either" where only one number is typed. */
export type DecimalSign = "." | "," | "either";

const SPACES = /[\s\u00a0\u2009\u202f']/g;
const NUMBER = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,3}))?$/;
/** Short whole numbers, by far the commonest, need none of the care below. */
const PLAIN = /^\d{1,6}$/;
const GROUPED = { ".": /^[+-]?\d{1,3}(,\d{3})+(\.|$)/, ",": /^[+-]?\d{1,3}(\.\d{3})+(,|$)/ };

/**
 * A decimal number as an integer of a finer unit, without a float in between: "3,482" volts
 * with `digits` 3 is 3482 mV. Further decimals are rounded half away from zero.
 * @returns null when the text is no number, or one beyond 2^53
 */
export function readScaled(text: string, sign: DecimalSign, digits: number): number | null {
  if (PLAIN.test(text)) return Number(text) * 10 ** digits;
  const plain = plainNumber(text, sign);
  const match = plain === null ? null : NUMBER.exec(plain);
  if (!match) return null;
  const [, minus = "", whole = "", fraction = "", exponent = "0"] = match;
  if (whole === "" && fraction === "") return null;
  const shift = digits + Number(exponent);
  const all = whole + fraction;
  const point = whole.length + shift;
  if (point > 20 || point < -20) return Number(all) === 0 ? 0 : point < 0 ? 0 : null;
  const padded = point < 0 ? "0".repeat(-point) + all : all;
  const at = Math.max(0, point);
  const kept = padded.slice(0, at).padEnd(at, "0") || "0";
  const value = Number(kept) + (Number(padded[at] ?? "0") >= 5 ? 1 : 0);
  if (!Number.isSafeInteger(value)) return null;
  return minus === "-" && value !== 0 ? -value : value;
}

/** Grouping and the decimal comma taken out; null when two signs contradict each other. */
function plainNumber(text: string, sign: DecimalSign): string | null {
  const bare = text
    .trim()
    .replace(/\u2212/g, "-")
    .replace(SPACES, "");
  if (bare === "") return null;
  if (sign === "either") {
    return bare.includes(",") && bare.includes(".") ? null : bare.replace(",", ".");
  }
  const grouped = GROUPED[sign].test(bare);
  if (sign === ".") return grouped ? bare.replaceAll(",", "") : bare;
  if (bare.includes(".") && !grouped) return null;
  return bare.replaceAll(".", "").replace(",", ".");
}
