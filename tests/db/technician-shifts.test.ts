import { randomUUID } from "node:crypto";
import { expect, it } from "vitest";
import { loadTechniciansToPlan } from "@/db/queries/planning-fleet";
import { findTechnician } from "@/db/queries/technicians";
import { saveTechnician } from "@/lib/usecases/save-technician";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const register = await smallRegister(db);
const deps = testDeps(db, new Date("2026-12-01T09:00:00Z"));
const administrator = await register.actor(["administrator"]);
const technician = await register.actor(["technician"]);
const [depotId, crewId, id] = [randomUUID(), randomUUID(), randomUUID()];
await db
  .insertInto("depot")
  .values({ id: depotId, name: "North bank", latitude: 52.5, longitude: 0.1 })
  .execute();
await db.insertInto("crew").values({ id: crewId, name: "North", depotId }).execute();

const save = (shift: Record<string, unknown>) =>
  saveTechnician(deps, administrator, {
    ...{ id, personId: technician.personId, crewId, vanId: "", tickets: [] },
    shifts: [{ weekday: 1, starts: "08:00", ends: "16:00", ...shift }],
  } as never);

it("keeps a break, plans with it, and takes it away again", async () => {
  await save({ breakStarts: "12:00", breakEnds: "12:30" });
  const stored = await findTechnician(db, id);
  expect(stored?.shifts).toMatchObject([{ breakStarts: "12:00:00", breakEnds: "12:30:00" }]);
  const [planned] = await loadTechniciansToPlan(db, []);
  expect(planned?.shifts[0]?.breakStarts).toBe("12:00:00");
  await save({ breakStarts: "", breakEnds: "" });
  expect((await findTechnician(db, id))?.shifts).toMatchObject([{ breakStarts: null }]);
});

it.each([
  ["without an end", { breakStarts: "12:00", breakEnds: "" }, "leave both empty"],
  ["that ends first", { breakStarts: "12:00", breakEnds: "11:00" }, "within the shift"],
  ["outside the shift", { breakStarts: "15:45", breakEnds: "16:30" }, "within the shift"],
])("refuses a break %s, by its field", async (_, shift, words) => {
  await expect(save(shift)).rejects.toMatchObject({
    faults: [{ field: "shifts.0.breakEnds", message: expect.stringContaining(words) }],
  });
});

it("the database refuses it too", async () => {
  const row = { technicianId: id, weekday: 2, starts: "08:00", ends: "16:00" };
  const broken = db
    .insertInto("shift")
    .values({ ...row, breakStarts: "17:00", breakEnds: "18:00" });
  await expect(broken.execute()).rejects.toThrow(/shift_break_within/);
});
