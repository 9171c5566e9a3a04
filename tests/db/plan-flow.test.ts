import { randomUUID } from "node:crypto";
import { expect, it } from "vitest";
import { comparePlans } from "@/lib/usecases/compare-plans";
import { discardPlan } from "@/lib/usecases/discard-plan";
import { editPlan } from "@/lib/usecases/edit-plan";
import { improvePlan } from "@/lib/usecases/improve-plan";
import { markAbsent } from "@/lib/usecases/mark-absent";
import { planWeek } from "@/lib/usecases/plan-week";
import { pricePlanAct } from "@/lib/usecases/price-plan-act";
import { publishPlan } from "@/lib/usecases/publish-plan";
import { previewPublication } from "@/lib/usecases/read-publication";
import { readRoundsBoard } from "@/lib/usecases/read-rounds-board";
import { revisePlan } from "@/lib/usecases/revise-plan";
import { runPlanJob } from "@/lib/usecases/run-plan-job";
import { stopSearch } from "@/lib/usecases/stop-search";
import { undoPlanEdit } from "@/lib/usecases/undo-plan-edit";
import { testDatabase } from "../support/database";
import { systemActor, testDeps } from "../support/deps";
import { smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const register = await smallRegister(db);
const deps = testDeps(db, new Date("2026-12-01T09:00:00Z"));
const dispatcher = await register.actor(["dispatcher"]);
const crew = await twoTechnicians();
await packsAboutToStop();

/** Two technicians of one crew, Monday to Friday, 08:00 to 16:00. */
async function twoTechnicians() {
  const [depotId, crewId] = [randomUUID(), randomUUID()];
  const depot = { id: depotId, name: "North bank", latitude: 52.52, longitude: 0.12 };
  await db.insertInto("depot").values(depot).execute();
  await db.insertInto("crew").values({ id: crewId, name: "North", depotId }).execute();
  const ids: string[] = [];
  for (const name of ["Ada", "Bram"]) {
    const person = await register.actor(["technician"]);
    await db.updateTable("person").set({ name }).where("id", "=", person.personId).execute();
    const id = randomUUID();
    await db.insertInto("technician").values({ id, personId: person.personId, crewId }).execute();
    const shift = { technicianId: id, starts: "08:00", ends: "16:00" };
    await db
      .insertInto("shift")
      .values([1, 2, 3, 4, 5].map((weekday) => ({ ...shift, weekday })))
      .execute();
    ids.push(id);
  }
  return { crewId, ada: ids[0]!, bram: ids[1]! };
}

/** Every asset has a pack whose device stops within the next fortnight. */
async function packsAboutToStop() {
  await db.updateTable("deviceModel").set({ silenceCostMinorPerHour: 300 }).execute();
  for (const assetId of register.assets) {
    const packId = randomUUID();
    await db
      .insertInto("pack")
      .values({
        ...{ id: packId, assetId, cellTypeId: register.lr20, lotId: register.lotId },
        ...{ series: 2, parallel: 1, installedAt: new Date("2024-12-01T00:00:00Z") },
      })
      .execute();
    const day = (n: number) => new Date(Date.UTC(2026, 11, 1 + n));
    const first = Date.UTC(2026, 11, 1) / 86_400_000;
    await db
      .insertInto("forecast")
      .values({
        ...{ packId, computedAt: day(0), p05: day(1), p20: day(4), p50: day(7), p80: day(11) },
        ...{ p95: day(13), cdfDays: Array.from({ length: 50 }, (_, i) => first + i * 0.28) },
        ...{ shareLeftPermille: 40, shareLeftLowPermille: 10, shareLeftHighPermille: 80 },
        ...{ drawUa: 900, outNowPermille: 10, basis: "{}" },
      })
      .execute();
  }
}

const mails = () => db.selectFrom("outboundMail").selectAll().orderBy("createdAt").execute();

async function builtPlan(week = "2026-12-07") {
  const { planId } = await planWeek(deps, dispatcher, { week });
  expect(await runPlanJob(deps, systemActor, { planId, mode: "build" })).toEqual({ built: true });
  return planId;
}

async function board(planId: string) {
  const view = await readRoundsBoard(deps, dispatcher, { planId } as never);
  return { ...view, version: view.plan!.version };
}

/** The site's stop on the other technician's Wednesday. */
async function otherPlace(planId: string) {
  const { rounds } = await board(planId);
  const technicianId = rounds[0]!.technicianId === crew.ada ? crew.bram : crew.ada;
  return { kind: "move" as const, siteId: register.siteId, technicianId, day: "2026-12-09" };
}

it("builds a draft in the worker, and sends nothing", async () => {
  const planId = await builtPlan();
  const { rounds, plan } = await board(planId);
  expect(plan?.state).toBe("draft");
  expect(rounds.flatMap((r) => r.stops.flatMap((s) => s.tasks))).toHaveLength(3);
  expect(await mails()).toEqual([]);
  // The queue may hand a job out twice (at-least-once delivery): the second run does nothing.
  expect(await runPlanJob(deps, systemActor, { planId, mode: "build" })).toEqual({ built: false });
  await discardPlan(deps, dispatcher, { planId });
});

it("prices an act, does exactly that, and takes it back", async () => {
  const planId = await builtPlan();
  const before = await board(planId);
  const act = await otherPlace(planId);
  const priced = await pricePlanAct(deps, dispatcher, { planId, act });
  const done = await editPlan(deps, dispatcher, { planId, version: before.version, act });
  expect(done.price).toEqual(priced);
  const after = await board(planId);
  expect(after.rounds.map((r) => [r.technicianId, r.day])).toEqual([[act.technicianId, act.day]]);
  await undoPlanEdit(deps, dispatcher, { planId, version: done.version });
  expect((await board(planId)).rounds).toEqual(before.rounds);
  await discardPlan(deps, dispatcher, { planId });
});

it("improves a draft, ends when asked to stop, and takes the improvement back", async () => {
  const planId = await builtPlan();
  const act = await otherPlace(planId);
  const { version } = await board(planId);
  const moved = await editPlan(deps, dispatcher, { planId, version, act });
  const where = async () =>
    (await board(planId)).rounds.map((r) => [r.technicianId, r.day, r.stops.map((s) => s.siteId)]);
  const before = await where();
  await improvePlan(deps, dispatcher, { planId, version: moved.version });
  expect(deps.enqueued.at(-1)).toMatchObject({ name: "plan", data: { mode: "improve" } });
  await stopSearch(deps, dispatcher, { planId });
  await stopSearch(deps, dispatcher, { planId });
  expect((await board(planId)).plan).toMatchObject({ state: "building", stopping: true });
  expect(await runPlanJob(deps, systemActor, { planId, mode: "improve" })).toEqual({ built: true });
  const improved = await board(planId);
  expect(improved.plan).toMatchObject({
    ...{ state: "draft", stopping: false, undo: "the improvement" },
  });
  const undone = await undoPlanEdit(deps, dispatcher, { planId, version: improved.version });
  expect(await where()).toEqual(before);
  // the edit before it can still be taken back
  expect((await board(planId)).plan?.undo).toBe("moving a stop");
  await undoPlanEdit(deps, dispatcher, { planId, version: undone.version });
  await discardPlan(deps, dispatcher, { planId });
});

it("improves a draft from where it stands, also by moves that nobody has been told of", async () => {
  const planId = await builtPlan();
  const first = await board(planId);
  await editPlan(deps, dispatcher, {
    planId,
    version: first.version,
    act: await otherPlace(planId),
  });
  const { version } = await board(planId);
  await improvePlan(deps, dispatcher, { planId, version });
  expect(await runPlanJob(deps, systemActor, { planId, mode: "improve" })).toEqual({ built: true });
  const { rounds, plan } = await board(planId);
  expect(rounds.flatMap((r) => r.stops.flatMap((s) => s.tasks))).toHaveLength(3);
  // By hand it went to a dearer day; back on its own the plan costs what it did.
  expect(rounds.map((r) => r.day)).toEqual(first.rounds.map((r) => r.day));
  expect(plan?.state).toBe("draft");
  await discardPlan(deps, dispatcher, { planId });
});

it("lets only one of two dispatchers win, and names the reason of a refusal", async () => {
  const planId = await builtPlan();
  const { version } = await board(planId);
  const act = await otherPlace(planId);
  await editPlan(deps, dispatcher, { planId, version, act });
  await expect(editPlan(deps, dispatcher, { planId, version, act })).rejects.toMatchObject({
    code: "conflict",
    message: expect.stringContaining("Somebody changed this plan"),
  });
  const saturday = { ...act, day: "2026-12-12" };
  await expect(
    editPlan(deps, dispatcher, { planId, version: version + 1, act: saturday }),
  ).rejects.toMatchObject({ message: expect.stringContaining("does not work that day") });
  await discardPlan(deps, dispatcher, { planId });
});

it("says before publishing which cells stores and vans lack", async () => {
  const planId = await builtPlan();
  expect(await previewPublication(deps, dispatcher, { planId })).toMatchObject({ shortages: [] });
  const had = await db.selectFrom("lotStock").selectAll().execute();
  await db.updateTable("lotStock").set({ cells: 3 }).execute();
  const { shortages } = await previewPublication(deps, dispatcher, { planId });
  // Three packs of two cells, three cells in one lot: one pack is served, two go without.
  expect(shortages).toEqual([{ designation: "LR20", cells: 4, tags: ["QF-0002", "QF-0003"] }]);
  for (const { lotId, placeId, cells } of had) {
    const row = db.updateTable("lotStock").set({ cells }).where("lotId", "=", lotId);
    await row.where("placeId", "=", placeId).execute();
  }
  await discardPlan(deps, dispatcher, { planId });
});

it("lays two drafts side by side: figures, and the visit that stands elsewhere", async () => {
  const first = await builtPlan();
  const second = await builtPlan();
  const same = await comparePlans(deps, dispatcher, { planId: first, otherId: second });
  expect(same.words).toBe("No visit changes its day or its technician.");
  expect(same.figures.map((figure) => figure.change)).toEqual(same.figures.map(() => "same"));
  const { version } = await board(second);
  await editPlan(deps, dispatcher, { planId: second, version, act: await otherPlace(second) });
  const apart = await comparePlans(deps, dispatcher, { planId: first, otherId: second });
  expect(apart.words).toMatch(/^1 visit moved/);
  expect(apart.changes).toMatchObject([
    { site: "Sluice 9", after: expect.stringMatching(/9 Dec, /) },
  ]);
  expect(apart.figures.find((f) => f.label === "Swaps")?.values).toEqual(["3", "3"]);
  for (const planId of [first, second]) await discardPlan(deps, dispatcher, { planId });
});

/** A done round of last week whose stop at the site could not be done. */
async function couldNotBeDone(day: string, returnOn: string | null) {
  const [planId, roundId] = [randomUUID(), randomUUID()];
  const at = new Date(`${day}T10:00:00Z`);
  const days = { firstDay: day, lastDay: day };
  const plan = {
    id: planId,
    name: "Before",
    ...days,
    state: "published",
    createdAt: at,
    publishedAt: at,
  };
  await db.insertInto("plan").values(plan).execute();
  await db
    .insertInto("round")
    .values({
      ...{ id: roundId, planId, technicianId: crew.ada, day, state: "done", icalUid: roundId },
      ...{ startsAt: at, endsAt: at, driveS: 0, workS: 0, distanceM: 0, overtimeS: 0 },
    })
    .execute();
  await db
    .insertInto("stop")
    .values({
      ...{ id: randomUUID(), roundId, siteId: register.siteId, position: 1, arrivesAt: at },
      ...{ departsAt: at, state: "cannot_do", cannotReason: "flooded", returnOn },
    })
    .execute();
}

it("does not go before the day a technician named, and says so where that leaves no day", async () => {
  await couldNotBeDone("2026-11-26", "2026-12-10");
  const within = await builtPlan();
  const days = (await board(within)).rounds.map((round) => round.day);
  expect(days.length).toBeGreaterThan(0);
  expect(days.every((day) => day >= "2026-12-10")).toBe(true);
  const early = { kind: "move" as const, siteId: register.siteId, day: "2026-12-08" };
  const { refusals } = await pricePlanAct(deps, dispatcher, {
    planId: within,
    act: { ...early, technicianId: crew.ada },
  });
  expect(refusals).toEqual([
    expect.stringMatching(/flooded at the last visit, not before .*10 Dec/),
  ]);
  await discardPlan(deps, dispatcher, { planId: within });

  await couldNotBeDone("2026-11-27", "2026-12-21");
  const beyond = await builtPlan();
  const { rounds, leftOut } = await board(beyond);
  expect(rounds).toEqual([]);
  expect(leftOut.map(({ tag, why }) => [tag, why])).toEqual(
    ["QF-0001", "QF-0002", "QF-0003"].map((tag) => [
      tag,
      expect.stringMatching(/^flooded at the last visit, .*: earliest .*21 Dec/),
    ]),
  );
  await discardPlan(deps, dispatcher, { planId: beyond });

  // A later "can't do it" without a day: the next plan may go at once.
  await couldNotBeDone("2026-11-30", null);
  const again = await builtPlan();
  expect((await board(again)).rounds).not.toEqual([]);
  await discardPlan(deps, dispatcher, { planId: again });
});

it("publishes, then changes, then repairs: one mail to each whose day changed, RFC 5545 rules", async () => {
  const planId = await builtPlan();
  const first = await board(planId);
  const preview = await previewPublication(deps, dispatcher, { planId });
  expect(preview.mails.map((mail) => mail.kind)).toEqual(["published"]);
  await publishPlan(deps, dispatcher, { planId, version: first.version });
  const [sent] = await mails();
  const calendar = (mail: { props: unknown }) =>
    (mail.props as { calendar: { uid: string; sequence: number } }).calendar;
  expect(sent?.template).toBe("round-published");
  expect(calendar(sent!).sequence).toBe(0);

  const revised = await revisePlan(deps, dispatcher, { day: "2026-12-08" });
  await expect(
    publishPlan(deps, dispatcher, { planId: revised.planId, version: revised.version }),
  ).rejects.toMatchObject({ message: expect.stringContaining("nothing new") });
  const act = await otherPlace(revised.planId);
  const edit = await editPlan(deps, dispatcher, { ...revised, act });
  expect(await mails()).toHaveLength(1);
  await publishPlan(deps, dispatcher, { planId: revised.planId, version: edit.version });
  const news = (await mails()).slice(1);
  expect(news.map((mail) => mail.template).sort()).toEqual(["round-cancelled", "round-published"]);
  const gone = calendar(news.find((mail) => mail.template === "round-cancelled")!);
  // RFC 5545 3.8.7.4: a later revision of the same UID carries a higher SEQUENCE.
  expect(gone).toMatchObject({ uid: calendar(sent!).uid, sequence: 1 });

  const away = { firstDay: act.day, lastDay: act.day, reason: "ill" };
  const ill = await markAbsent(deps, dispatcher, { technicianId: act.technicianId, ...away });
  expect(ill.roundsLeftOpen).toBe(1);
  const repairId = ill.planId!;
  await runPlanJob(deps, systemActor, { planId: repairId, mode: "repair" });
  const repaired = await board(repairId);
  const drafted = repaired.rounds.filter((round) => round.state === "proposed");
  expect(drafted.flatMap((round) => round.stops)).toHaveLength(1);
  expect(drafted[0]).not.toMatchObject({ technicianId: act.technicianId, day: act.day });
  expect(await mails()).toHaveLength(3);
});
