import type { Kysely, Transaction } from "kysely";
import type { Database } from "../client";

export interface Organisation {
  readonly name: string;
  readonly timeZone: string;
  readonly currency: string;
  readonly locale: string;
  /** ISO weekdays, Monday 1. */
  readonly workingDays: readonly number[];
  readonly crewCostMinorPerHour: number;
  readonly overtimeCostMinorPerHour: number;
  readonly travelCostMinorPerKm: number;
  readonly detourFactor: number;
  readonly roadSpeedKmh: number;
  readonly travelTableUrl: string | null;
  /** When the organisation's own roads were set; null: it has none. */
  readonly roadsSetAt: Date | null;
  readonly mapTileUrl: string | null;
  /** Whether photos from phones keep where they were taken. */
  readonly keepPhotoPosition: boolean;
  readonly isDemonstration: boolean;
}

/** The organisation of this deployment, or null before it has been set up. */
export async function findOrganisation(db: Kysely<Database>): Promise<Organisation | null> {
  const row = await db.selectFrom("organisation").selectAll().executeTakeFirst();
  return row ? { ...row, detourFactor: Number(row.detourFactor) } : null;
}

/** @throws Error when the deployment has no organisation yet */
export async function getOrganisation(db: Kysely<Database>): Promise<Organisation> {
  const organisation = await findOrganisation(db);
  if (!organisation) throw new Error("No organisation yet: run `npm run first-administrator`.");
  return organisation;
}

export type OrganisationChange = Omit<Organisation, "isDemonstration" | "roadsSetAt">;

export async function updateOrganisation(
  trx: Transaction<Database>,
  { workingDays, ...change }: OrganisationChange,
): Promise<void> {
  await trx
    .updateTable("organisation")
    .set({ ...change, workingDays: [...workingDays] })
    .execute();
}

/** Makes the organisation of an empty deployment. @returns false when there is one already */
export async function insertOrganisation(
  trx: Transaction<Database>,
  organisation: Pick<Organisation, "name" | "timeZone" | "currency" | "locale">,
): Promise<boolean> {
  const row = await trx
    .insertInto("organisation")
    .values(organisation)
    .onConflict((conflict) => conflict.doNothing())
    .returning("id")
    .executeTakeFirst();
  return row !== undefined;
}
