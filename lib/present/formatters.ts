/**
 * Formatters by locale and options, made once: making one takes longer than a hundred uses, and a
 * board of two hundred stops writes thousands of words.
 */
const dates = new Map<string, Intl.DateTimeFormat>();
const numbers = new Map<string, Intl.NumberFormat>();

export function dateFormatter(
  locale: string,
  options: Intl.DateTimeFormatOptions,
): Intl.DateTimeFormat {
  const key = `${locale} ${JSON.stringify(options)}`;
  const known = dates.get(key) ?? new Intl.DateTimeFormat(locale, options);
  dates.set(key, known);
  return known;
}

export function numberFormatter(
  locale: string,
  options: Intl.NumberFormatOptions,
): Intl.NumberFormat {
  const key = `${locale} ${JSON.stringify(options)}`;
  const known = numbers.get(key) ?? new Intl.NumberFormat(locale, options);
  numbers.set(key, known);
  return known;
}
