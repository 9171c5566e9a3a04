import type { Transaction } from "kysely";
import type { Database } from "@/db/client";
import { lockAdministrators } from "@/db/queries/people-directory";
import { conflict } from "@/lib/errors";

/**
 * Refuses what would leave nobody to administer. Call it first in the transaction: it also makes
 * such changes wait for each other.
 * @throws AppError conflict when this person is the last active administrator
 */
export async function keepAnAdministrator(
  trx: Transaction<Database>,
  personId: string,
): Promise<void> {
  const administrators = await lockAdministrators(trx);
  if (administrators.length === 1 && administrators[0] === personId) {
    throw conflict("This is the last administrator. Make somebody else one first.");
  }
}
