/**
 * Extra work without signal: a pack found dying beside the planned one is swapped though no plan knows
 * of it. The truth is what the test typed, compared with the rows of PostgreSQL: one pack out with
 * its reason and voltage, one in from the van's lot, the van's stock and the return box by arithmetic.
 */
import { afterAll, beforeAll, expect, it } from "vitest";
import { expectAccessible, expectNoSidewaysScroll, productUrl } from "../support/browser";
import { type FieldScenario, fieldScenario } from "../support/field-scenario";
import { addNeighbour, type Neighbour } from "../support/neighbour";
import { Phone } from "../support/phone-browser";

const phone = new Phone();
let scenario: FieldScenario;
let neighbour: Neighbour;

beforeAll(async () => {
  scenario = await fieldScenario(process.env.DATABASE_URL ?? "", 2);
  neighbour = await addNeighbour(scenario);
  await phone.switchOn({ offline: false });
  await phone.signIn(scenario.email);
}, 240_000);

afterAll(async () => {
  await phone.throwAway();
  await scenario?.db.destroy();
});

const volts = () => ((scenario.stops[0]?.plausibleMv ?? 0) / 1000).toFixed(3);

it("swaps the neighbour of a planned asset in aeroplane mode", async () => {
  await phone.switchOff();
  await phone.switchOn({ offline: true });
  const { page } = phone;
  await page.goto(productUrl("/today"));
  await page.getByRole("list", { name: "Stops" }).getByRole("link").first().click();
  const beside = page.getByRole("region", { name: "Also here" });
  await beside.getByRole("link", { name: neighbour.tag }).click();
  await page.getByRole("heading", { level: 1, name: "Gauge beside the planned one" }).waitFor();
  await expectAccessible(page);
  await expectNoSidewaysScroll(page);
  await page.getByRole("link", { name: "Swap the pack" }).click();
  await page.getByLabel("Voltage of the old pack").fill(volts());
  // Nobody planned it: the reason stands at "early" without being pressed.
  const early = page.getByRole("button", { name: "Early, while here" });
  expect(await early.getAttribute("aria-pressed")).toBe("true");
  await page.getByRole("button", { name: neighbour.lotCode }).click();
  for (const box of await page.getByRole("checkbox").all()) await box.check();
  await page.getByRole("button", { name: "Keep this swap" }).click();
  // Back at the stop: the neighbour has fresh cells, the planned work is still to do.
  await beside.getByText("fresh cells").waitFor();
  expect(await page.getByRole("button", { name: "Leave: done here" }).count()).toBe(1);
  await expectAccessible(page);
}, 180_000);

it("counts once when the signal is back, with the van's stock and the return box", async () => {
  await phone.context.setOffline(false);
  await phone.page.goto(productUrl("/outbox"));
  await phone.page.getByText("Everything has been sent.").waitFor({ timeout: 60_000 });
  const { db, personId, vanPlaceId, stops } = scenario;
  const packs = await db
    .selectFrom("pack")
    .select(["id", "lotId", "reasonOut", "removedBy", "voltageOutMv"])
    .where("assetId", "=", neighbour.assetId)
    .orderBy("installedAt")
    .execute();
  expect(packs).toMatchObject([
    {
      ...{ id: neighbour.packId, lotId: null, reasonOut: "early", removedBy: personId },
      voltageOutMv: Number(volts()) * 1000,
    },
    { lotId: neighbour.lotId, reasonOut: null, removedBy: null },
  ]);
  const left = await db
    .selectFrom("lotStock")
    .select("cells")
    .where("lotId", "=", neighbour.lotId)
    .where("placeId", "=", vanPlaceId)
    .execute();
  expect(left.reduce((sum, row) => sum + row.cells, 0)).toBe(0);
  const box = await db
    .selectFrom("returnedCells")
    .select(["packId", "cells", "personId", "collectedAt"])
    .where("packId", "=", neighbour.packId)
    .execute();
  expect(box).toEqual([
    { packId: neighbour.packId, cells: neighbour.cells, personId, collectedAt: null },
  ]);
  const planned = await db
    .selectFrom("stop")
    .innerJoin("task", "task.stopId", "stop.id")
    .select(["stop.state as stop", "task.state as task"])
    .where("stop.id", "=", stops[0]?.id ?? "")
    .execute();
  expect(planned).toEqual([{ stop: "planned", task: "planned" }]);
}, 120_000);
