export const ERASE = "⌫";

/**
 * What a keypad entry reads after a key. A key that would make nonsense of it (a second decimal
 * sign, a fourth digit before it, one decimal too many) changes nothing.
 */
export function afterKey(value: string, key: string, sign: "." | ",", decimals: number): string {
  if (key === ERASE) return value.slice(0, -1);
  if (key === sign) return value.includes(sign) ? value : `${value || "0"}${sign}`;
  const [whole = "", fraction] = value.split(sign);
  if (fraction !== undefined) return fraction.length < decimals ? value + key : value;
  if (whole.length >= 3) return value;
  return value === "0" ? key : value + key;
}
