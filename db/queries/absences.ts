import type { Transaction } from "kysely";
import type { Database } from "../client";

export interface NewAbsence {
  readonly id: string;
  readonly technicianId: string;
  readonly firstDay: string;
  readonly lastDay: string;
  readonly reason: string;
}

/** Writes an absence; says when the technician is unknown or the days are taken by another. */
export async function insertAbsence(
  trx: Transaction<Database>,
  absence: NewAbsence,
): Promise<"written" | "unknown" | "overlaps"> {
  const technician = await trx
    .selectFrom("technician")
    .select("id")
    .where("id", "=", absence.technicianId)
    .forUpdate()
    .executeTakeFirst();
  if (!technician) return "unknown";
  const other = await trx
    .selectFrom("absence")
    .select("id")
    .where("technicianId", "=", absence.technicianId)
    .where("firstDay", "<=", absence.lastDay)
    .where("lastDay", ">=", absence.firstDay)
    .executeTakeFirst();
  if (other) return "overlaps";
  await trx.insertInto("absence").values(absence).execute();
  return "written";
}
