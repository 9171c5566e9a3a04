/** Pages at the most: a file longer than this is no list to read. */
const MOST_PAGES = 500;

/** Every row of a list that is read page by page, under the same filters. */
export async function allPages<Row>(
  read: (page: number) => Promise<{ rows: readonly Row[]; total: number }>,
): Promise<Row[]> {
  const rows: Row[] = [];
  for (let page = 1; page <= MOST_PAGES; page += 1) {
    const found = await read(page);
    rows.push(...found.rows);
    if (found.rows.length === 0 || rows.length >= found.total) break;
  }
  return rows;
}
