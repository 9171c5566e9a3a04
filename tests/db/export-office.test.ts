/** Lists of the office as CSV (RFC 4180): whole, under the list's own filters and rights. */
import { parse } from "csv-parse/sync";
import { beforeAll, expect, it } from "vitest";
import { exportAudit } from "@/lib/usecases/export-audit";
import { exportCosts } from "@/lib/usecases/export-costs";
import { exportPeople } from "@/lib/usecases/export-people";
import { exportClaims } from "@/lib/usecases/export-claims";
import type { PersonActor } from "@/lib/usecases/use-case";
import { testDatabase } from "../support/database";
import { testDeps } from "../support/deps";
import { smallRegister } from "../support/small-register";

const { db } = await testDatabase();
const deps = testDeps(db);
let administrator: PersonActor;

beforeAll(async () => {
  const register = await smallRegister(db);
  administrator = await register.actor(["administrator"]);
  for (let n = 0; n < 120; n += 1) await register.actor(["technician"]);
});

const everybody = {
  search: "",
  role: null,
  state: null,
  order: "name",
  descending: false,
  page: 1,
} as const;

/** Read back by a reader that is not the writer. */
const records = (text: string): string[][] => parse(text, { bom: true });

it("writes every page, not only the first", async () => {
  const rows = records(await exportPeople(deps, administrator, everybody));
  expect(rows).toHaveLength(1 + 121);
  expect(rows[0]?.[1]).toBe("mail address");
});

it("keeps the list's filters", async () => {
  const given = { ...everybody, role: "administrator" } as const;
  expect(records(await exportPeople(deps, administrator, given))).toHaveLength(2);
});

it("writes its head even where there is nothing", async () => {
  const audit = { page: 1, act: null, personId: null, fromDay: null, toDay: null };
  expect(records(await exportAudit(deps, administrator, audit))).toHaveLength(1);
  expect(records(await exportCosts(deps, administrator, { days: 730 }))).toHaveLength(1);
  const claims = await exportClaims(deps, administrator, { days: 365, crew: null });
  expect(records(claims)[0]).toContain("chance by then %");
});
