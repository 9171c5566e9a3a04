/** The sign between whole and fraction, as the organisation writes numbers. */
export function decimalSignOf(locale: string): "." | "," {
  return new Intl.NumberFormat(locale).format(1.5).includes(",") ? "," : ".";
}

/** A typed number in thousandths of its unit (V to mV, mA to uA); null when it is none. */
export function thousandths(typed: string): number | null {
  return scaled(typed, 1000);
}

/** A typed temperature in tenths of a degree; null when it is none. */
export function tenths(typed: string): number | null {
  return scaled(typed, 10);
}

function scaled(typed: string, factor: number): number | null {
  const plain = typed.trim().replace(",", ".").replace("−", "-");
  if (!/^-?\d+(\.\d*)?$/.test(plain)) return null;
  return Math.round(Number(plain) * factor);
}
