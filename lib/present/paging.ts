/** The pages a pager offers: both ends, the neighbours, and null where pages are passed over. */
export function pagesToOffer(page: number, pageCount: number): (number | null)[] {
  const wanted = [1, page - 1, page, page + 1, pageCount];
  const pages = [...new Set(wanted)].filter((n) => n >= 1 && n <= pageCount).sort((a, b) => a - b);
  return pages.flatMap((n, i) => (i > 0 && n - (pages[i - 1] ?? n) > 1 ? [null, n] : [n]));
}

/** Which rows a page shows: "101–200 of 1,284 assets"; "no assets" when there are none. */
export function pageSummary(
  page: number,
  pageSize: number,
  total: number,
  noun: string,
  locale: string,
): string {
  if (total === 0) return `no ${noun}`;
  const number = new Intl.NumberFormat(locale);
  const first = (page - 1) * pageSize + 1;
  const last = Math.min(total, page * pageSize);
  return `${number.format(first)}–${number.format(last)} of ${number.format(total)} ${noun}`;
}

/**
 * A list's address with some of its parameters changed; null or "" takes one off. Any change but
 * that of the page starts again at the first page.
 */
export function hrefWith(
  path: string,
  current: Readonly<Record<string, string | readonly string[] | undefined>>,
  changes: Readonly<Record<string, string | number | null>>,
): string {
  const next = new URLSearchParams();
  for (const [key, value] of Object.entries(current)) {
    if (key in changes || (key === "page" && !("page" in changes))) continue;
    for (const one of Array.isArray(value) ? value : [value]) if (one) next.append(key, one);
  }
  for (const [key, value] of Object.entries(changes)) {
    if (value !== null && value !== "") next.append(key, String(value));
  }
  const query = next.toString();
  return query ? `${path}?${query}` : path;
}
