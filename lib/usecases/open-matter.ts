import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { lockMatter } from "@/db/queries/field-matters";
import { conflict, notFound } from "@/lib/errors";

/**
 * A matter that still waits for a decision, locked.
 * @throws AppError not_found, conflict when somebody was quicker
 */
export async function openMatter(trx: Transaction<Database>, id: string) {
  const matter = await lockMatter(trx, id);
  if (!matter) throw notFound("This matter");
  if (matter.closedAt) {
    throw conflict("Somebody decided this meanwhile. Load the page again to see how.");
  }
  return matter;
}
