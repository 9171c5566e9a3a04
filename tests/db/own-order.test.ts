/**
 * A technician's own order of a round against the office's changes of the plan: it is kept, or both
 * are told. The rule is the product's own (the issue asks that nothing is replaced silently); what
 * stands afterwards is read from PostgreSQL, not from the code's own words.
 */
import { randomUUID } from "node:crypto";
import { beforeEach, expect, it } from "vitest";
import { publishPlan } from "@/lib/usecases/publish-plan";
import { readFieldDay } from "@/lib/usecases/read-field-day";
import { previewPublication } from "@/lib/usecases/read-publication";
import { revisePlan } from "@/lib/usecases/revise-plan";
import { syncEntries } from "@/lib/usecases/sync-entries";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { type PhoneRound, phoneRound } from "../support/phone-round";
import { smallRegister } from "../support/small-register";

const DAY = "2026-12-03";
const { db } = await testDatabase();
const register = await smallRegister(db);
const office = await register.actor(["dispatcher"]);
const opened = testDeps(db, new Date("2026-12-01T12:00:00Z"));
const later = testDeps(db, new Date("2026-12-01T13:00:00Z"));
let phone: PhoneRound;
let stops: string[];

beforeEach(async () => {
  await db.deleteFrom("outboundMail").execute();
  await db.deleteFrom("syncEntry").execute();
  await db.deleteFrom("plan").execute();
  phone = await phoneRound(db, register, DAY);
  stops = [phone.stopId, await addStop(2, "09:30", 52.51), await addStop(3, "10:30", 52.53)];
});

async function addStop(position: number, time: string, latitude: number): Promise<string> {
  const [id, siteId] = [randomUUID(), randomUUID()];
  const site = { id: siteId, code: siteId, name: `Weir ${position}`, latitude, longitude: 0.1 };
  await db.insertInto("site").values(site).execute();
  const arrivesAt = new Date(`${DAY}T${time}:00Z`);
  const departsAt = new Date(arrivesAt.getTime() + 600_000);
  const stop = { id, roundId: phone.roundId, siteId, position, arrivesAt, departsAt };
  await db.insertInto("stop").values(stop).execute();
  return id;
}

/** The technician puts the last stop first; `deps` says when it reaches the server. */
async function reorder(deps = later): Promise<string[]> {
  const order = [stops[2] ?? "", stops[0] ?? "", stops[1] ?? ""];
  const { personId } = phone.technician;
  const { response } = await syncEntries(deps, phone.technician, {
    ...{ deviceId: "phone-one", sentAt: deps.now().toISOString() },
    entries: [
      {
        ...{ id: randomUUID(), personId, happenedAt: "2026-12-01T11:00:00.000Z" },
        body: { kind: "reorder", roundId: phone.roundId, stopIds: order },
      },
    ],
  });
  expect(response.outcomes[0]?.outcome).toBe("applied");
  return order;
}

/** The office opens the week and makes the draft's visits longer, so that there is news to publish. */
async function draft() {
  const revised = await revisePlan(opened, office, { day: DAY });
  const drafted = await db
    .selectFrom("stop")
    .innerJoin("round", "round.id", "stop.roundId")
    .select(["stop.id", "stop.departsAt", "stop.position"])
    .where("round.planId", "=", revised.planId)
    .orderBy("stop.position")
    .execute();
  expect(drafted).toHaveLength(3);
  for (const { id, departsAt } of drafted) {
    const longer = new Date(departsAt.getTime() + 360_000);
    await db.updateTable("stop").set({ departsAt: longer }).where("id", "=", id).execute();
  }
  const end = new Date(`${DAY}T16:30:00Z`);
  await db.updateTable("round").set({ endsAt: end }).where("planId", "=", revised.planId).execute();
  return { ...revised, drafted };
}

const stopsNow = () =>
  db
    .selectFrom("stop")
    .select(["id", "arrivesAt", "departsAt"])
    .where("roundId", "=", phone.roundId)
    .orderBy("position")
    .execute();
const mail = async () => {
  const row = await db.selectFrom("outboundMail").select("props").executeTakeFirstOrThrow();
  return (row.props as { changes: string[] }).changes.join(" ");
};

it("an order that came after the draft was opened is kept, and both are told", async () => {
  const { planId, version } = await draft();
  const order = await reorder();
  const preview = await previewPublication(later, office, { planId });
  expect(preview.mails).toMatchObject([{ kind: "changed", ownOrder: "kept" }]);
  await publishPlan(later, office, { planId, version });
  const now = await stopsNow();
  expect(now.map((stop) => stop.id)).toEqual(order);
  // The office's own change came through: every visit is six minutes longer (30, 10 and 10 before).
  const minutes = now.map((stop) => (stop.departsAt.getTime() - stop.arrivesAt.getTime()) / 60_000);
  expect(minutes).toEqual([16, 36, 16]);
  expect(now.map((stop) => stop.arrivesAt).sort((a, b) => +a - +b)).toEqual(
    now.map((stop) => stop.arrivesAt),
  );
  expect(await mail()).toContain("Your own order of the stops is kept.");
});

it("an order the draft was made from is replaced only in sight of both", async () => {
  await reorder(testDeps(db, new Date("2026-12-01T11:30:00Z")));
  const { planId, version, drafted } = await draft();
  // The dispatcher puts the first visit last.
  for (const [n, { id }] of drafted.entries()) {
    const position = n === 0 ? 9 : n;
    await db.updateTable("stop").set({ position }).where("id", "=", id).execute();
  }
  const preview = await previewPublication(later, office, { planId });
  expect(preview.mails).toMatchObject([{ ownOrder: "replaced" }]);
  await publishPlan(later, office, { planId, version });
  expect((await stopsNow()).map((stop) => stop.id)).toEqual(stops);
  expect(await mail()).toContain("your own no longer holds");
  const day = await readFieldDay(
    testDeps(db, new Date("2026-12-02T09:00:00Z")),
    phone.technician,
    {},
  );
  const round = day.rounds.find((one) => one.id === phone.roundId);
  expect(round).toMatchObject({ reorderedAt: null, orderReplacedAt: later.now().toISOString() });
});

it("a draft that leaves the technician's order alone leaves it theirs", async () => {
  const order = await reorder(testDeps(db, new Date("2026-12-01T11:30:00Z")));
  const { planId, version } = await draft();
  const preview = await previewPublication(later, office, { planId });
  expect(preview.mails).toMatchObject([{ ownOrder: "none" }]);
  await publishPlan(later, office, { planId, version });
  expect((await stopsNow()).map((stop) => stop.id)).toEqual(order);
  const round = await db
    .selectFrom("round")
    .select(["reorderedAt", "orderReplacedAt"])
    .where("id", "=", phone.roundId)
    .executeTakeFirstOrThrow();
  expect(round.reorderedAt).not.toBeNull();
  expect(round.orderReplacedAt).toBeNull();
});
