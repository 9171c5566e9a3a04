import { beforeEach, describe, expect, it } from "vitest";
import { sql } from "kysely";
import { findUsableApiKey } from "@/db/queries/api-keys";
import { changeOrganisation } from "@/lib/usecases/change-organisation";
import { changePerson } from "@/lib/usecases/change-person";
import { chooseDigest } from "@/lib/usecases/choose-digest";
import { createApiKey } from "@/lib/usecases/create-api-key";
import { foundOrganisation } from "@/lib/usecases/found-organisation";
import { listAudit } from "@/lib/usecases/list-audit";
import { hashOfSecret } from "@/lib/usecases/one-time-secret";
import { readOrganisation } from "@/lib/usecases/read-organisation";
import { revokeApiKey } from "@/lib/usecases/revoke-api-key";
import { testDatabase } from "@/tests/support/database";
import { systemActor, testDeps } from "@/tests/support/deps";
import { addPerson, foundBoard, PASSWORD } from "./house";

const { db } = await testDatabase();
const deps = testDeps(db);

beforeEach(async () => {
  await sql`truncate organisation, person, api_key, audit_entry cascade`.execute(db);
});

const FOUNDING = {
  organisation: "Quillmere Drainage Board",
  timeZone: "Europe/London",
  currency: "GBP",
  locale: "en-GB",
  name: "Ada Marsh",
  email: "ada@quillmere.example",
  password: PASSWORD,
};

describe("the first administrator", () => {
  it("is made once, also when two try at the same moment", async () => {
    const outcomes = await Promise.allSettled([
      foundOrganisation(deps, systemActor, FOUNDING),
      foundOrganisation(deps, systemActor, { ...FOUNDING, email: "eve@quillmere.example" }),
    ]);
    expect(outcomes.map((outcome) => outcome.status).sort()).toEqual(["fulfilled", "rejected"]);
    const people = await db.selectFrom("person").select("roles").execute();
    expect(people).toEqual([{ roles: ["administrator"] }]);
  });

  it("gets a link when no password is given", async () => {
    const { url } = await foundOrganisation(deps, systemActor, { ...FOUNDING, password: null });
    expect(url).toMatch(/^https:\/\/wanewright\.example\/welcome\?token=[0-9a-f]{64}$/);
  });
});

describe("the last administrator", () => {
  it("stays, also when two take away each other's role at the same moment", async () => {
    await foundBoard(db);
    const one = await addPerson(db, ["administrator"]);
    const two = await addPerson(db, ["administrator"]);
    const demote = (by: typeof one, whom: typeof one) =>
      changePerson(deps, by.actor, {
        personId: whom.id,
        name: "Ada Marsh",
        email: whom.email,
        roles: ["dispatcher"],
      });
    const outcomes = await Promise.allSettled([demote(one, two), demote(two, one)]);
    expect(outcomes.map((outcome) => outcome.status).sort()).toEqual(["fulfilled", "rejected"]);
    const left = await db
      .selectFrom("person")
      .select("id")
      .where(sql<boolean>`'administrator' = any(roles)`)
      .execute();
    expect(left).toHaveLength(1);
  });
});

describe("an API key", () => {
  it("is shown once, kept as a hash, and refused once revoked", async () => {
    await foundBoard(db);
    const { actor } = await addPerson(db, ["administrator"]);
    const { secret } = await createApiKey(deps, actor, {
      name: "Bridge",
      scopes: ["readings:write"],
    });
    const stored = await db.selectFrom("apiKey").selectAll().executeTakeFirstOrThrow();
    expect(JSON.stringify(stored)).not.toContain(secret);
    const found = await findUsableApiKey(db, hashOfSecret(secret), deps.now());
    expect(found).toEqual({ id: stored.id, scopes: ["readings:write"] });
    await revokeApiKey(deps, actor, { apiKeyId: stored.id });
    expect(await findUsableApiKey(db, hashOfSecret(secret), deps.now())).toBeNull();
  });
});

describe("the organisation", () => {
  const entries = {
    ...{ name: "Quillmere Drainage Board", timeZone: "Europe/Berlin", locale: "de-DE" },
    ...{ currency: "eur", workingDays: [5, 1, 1], crewCostPerHour: "41,50" },
    ...{ overtimeCostPerHour: "60", travelCostPerKm: "0.455", detourFactor: "1,35" },
    ...{ roadSpeedKmh: "50", travelTableUrl: "", mapTileUrl: "", keepPhotoPosition: false },
  };

  it("keeps money in the currency's minor unit, however the decimal was typed", async () => {
    await foundBoard(db);
    const { actor } = await addPerson(db, ["administrator"]);
    await changeOrganisation(deps, actor, entries);
    expect(await readOrganisation(deps, actor, {})).toMatchObject({
      ...{ currency: "EUR", workingDays: [1, 5], crewCostMinorPerHour: 4150 },
      ...{ overtimeCostMinorPerHour: 6000, travelCostMinorPerKm: 46, detourFactor: 1.35 },
    });
    // ISO 4217: the yen has no minor unit.
    await changeOrganisation(deps, actor, { ...entries, currency: "JPY", crewCostPerHour: "4100" });
    expect(await readOrganisation(deps, actor, {})).toMatchObject({ crewCostMinorPerHour: 4100 });
  });

  it("names each entry that is wrong", async () => {
    await foundBoard(db);
    const { actor } = await addPerson(db, ["administrator"]);
    const wrong = { timeZone: "Mars/Olympus", currency: "QQQ", workingDays: [], mapTileUrl: "x" };
    const error: unknown = await changeOrganisation(deps, actor, { ...entries, ...wrong }).catch(
      (reason: unknown) => reason,
    );
    const fields = (error as { faults: { field: string }[] }).faults.map((fault) => fault.field);
    expect(fields.sort()).toEqual(["currency", "mapTileUrl", "timeZone", "workingDays"]);
  });
});

describe("digests and the audit", () => {
  it("lets nobody but an administrator choose another's digest", async () => {
    await foundBoard(db);
    const one = await addPerson(db, ["supervisor"]);
    const two = await addPerson(db, ["supervisor"]);
    const choice = { weekdays: [1], sendAt: "07:00", horizonDays: "14" };
    await chooseDigest(deps, one.actor, { personId: one.id, ...choice });
    await expect(
      chooseDigest(deps, one.actor, { personId: two.id, ...choice }),
    ).rejects.toMatchObject({ code: "forbidden" });
  });

  it("finds entries by local day through the end of summer time", async () => {
    await foundBoard(db);
    const { id, actor } = await addPerson(db, ["supervisor"]);
    // 2027-10-31 in London has 25 hours (IANA time zone database, GB-Eire): 23:00Z to 24:00Z.
    const instants = ["2027-10-30T22:59:59Z", "2027-10-30T23:00:00Z", "2027-10-31T23:59:59Z"];
    for (const at of [...instants, "2027-11-01T00:00:00Z"]) {
      const entry = { at: new Date(at), personId: id, act: at, subjectKind: "person" };
      await db.insertInto("auditEntry").values(entry).execute();
    }
    const day = "2027-10-31";
    const view = await listAudit(deps, actor, {
      ...{ page: 1, act: null, personId: null, fromDay: day, toDay: day },
    });
    expect(view.rows.map((row) => row.act)).toEqual([instants[2], instants[1]]);
  });
});
