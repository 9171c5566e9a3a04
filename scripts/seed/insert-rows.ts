import type { Insertable, Transaction } from "kysely";
import type { Database } from "@/db/client";

/** PostgreSQL takes 65,535 parameters a statement; half of it keeps statements moderate. */
const MOST_PARAMETERS = 32_000;

/** Inserts many rows in as few statements as the protocol allows. Every row has the same keys. */
export async function insertRows<Table extends keyof Database & string>(
  trx: Transaction<Database>,
  table: Table,
  rows: readonly Insertable<Database[Table]>[],
): Promise<void> {
  const first = rows[0];
  if (!first) return;
  const size = Math.floor(MOST_PARAMETERS / Object.keys(first).length);
  for (let from = 0; from < rows.length; from += size) {
    await trx
      .insertInto(table)
      .values(rows.slice(from, from + size) as never)
      .execute();
  }
}
