/**
 * A whole day without signal, from the wording: twelve stops entered in aeroplane mode
 * with the browser killed and started again in between, then signal under which three requests in
 * ten fail and every one that goes through is sent twice. The truth is what the test typed: it is
 * compared with the rows of PostgreSQL, read past the product.
 */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { type BrowserContext, chromium, type Page } from "playwright-core";
import { afterAll, beforeAll, expect, it } from "vitest";
import accounts from "../../scripts/seed/demo-accounts.json";
import {
  expectAccessible,
  expectNoSidewaysScroll,
  productUrl,
  withoutBackgroundSync,
} from "../support/browser";
import { type FieldScenario, fieldScenario, type FieldStop } from "../support/field-scenario";

const profile = mkdtempSync(join(tmpdir(), "wanewright-phone-"));
const startedAt = new Date();
const errors: string[] = [];
let scenario: FieldScenario;
let phone: BrowserContext;
let page: Page;
const logged: FieldStop[] = [];
const swapped: FieldStop[] = [];

/** The phone switched on: the same profile, a new browser. */
async function switchOn(offline: boolean): Promise<void> {
  phone = await chromium.launchPersistentContext(profile, {
    executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
    viewport: { width: 360, height: 740 },
    hasTouch: true,
    locale: "en-GB",
    args: [
      ...["--headless", "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run"],
      ...["--disable-background-networking", "--disable-component-update", "--disable-sync"],
    ],
  });
  await phone.setOffline(offline);
  page = phone.pages()[0] ?? (await phone.newPage());
  await withoutBackgroundSync(page);
  page.on("console", (message) => {
    if (message.type() === "error") errors.push(message.text());
  });
  page.on("pageerror", (error) => errors.push(error.message));
}

beforeAll(async () => {
  scenario = await fieldScenario(process.env.DATABASE_URL ?? "", 12);
  await switchOn(false);
}, 240_000);

afterAll(async () => {
  await phone?.close();
  await scenario?.db.destroy();
  rmSync(profile, { recursive: true, force: true });
});

const stopLink = (n: number) => page.getByRole("list", { name: "Stops" }).getByRole("link").nth(n);

async function openToday(): Promise<void> {
  await page.goto(productUrl("/today"));
  await stopLink(0).waitFor();
}

async function typeVolts(millivolts: number): Promise<void> {
  for (const sign of (millivolts / 1000).toFixed(3)) {
    const name = sign === "." ? "Decimal sign" : sign;
    await page.getByRole("button", { name, exact: true }).click();
  }
}

async function log(stop: FieldStop, n: number, millivolts: number): Promise<void> {
  await stopLink(n).click();
  await page.getByRole("link", { name: "Log a voltage only" }).click();
  await typeVolts(millivolts);
  await page.getByRole("button", { name: "Keep this reading" }).click();
  await page.getByRole("link", { name: "Back to the round" }).click();
  logged.push({ ...stop, plausibleMv: millivolts });
}

async function swap(stop: FieldStop, n: number): Promise<void> {
  await stopLink(n).click();
  await page.getByRole("link", { name: "Swap the pack" }).first().click();
  await page.getByLabel("Voltage of the old pack").fill((stop.plausibleMv / 1000).toFixed(3));
  const code = `E2E-${stop.lotId.slice(0, 8)}`;
  await page.getByRole("button", { name: code }).click();
  for (const box of await page.getByRole("checkbox").all()) await box.check();
  await page.getByRole("button", { name: "Keep this swap" }).click();
  await page.getByRole("link", { name: "Back to the round" }).click();
  await stopLink(n).filter({ hasText: "done" }).waitFor();
  swapped.push(stop);
}

const stopAt = (n: number): FieldStop => {
  const stop = scenario.stops[n];
  if (!stop) throw new Error(`no stop ${n}`);
  return stop;
};

it("loads the day once and keeps the pages", async () => {
  await page.goto(productUrl("/sign-in?from=/today"));
  await page.getByLabel("Mail address").fill(scenario.email);
  await page.getByLabel("Password", { exact: true }).fill(accounts[0]?.password ?? "");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await stopLink(11).waitFor({ timeout: 60_000 });
  expect(await page.getByRole("heading", { level: 1 }).textContent()).toBe("12 stops, 61\u00a0km");
  const kept = async () =>
    page.evaluate(async () => (await (await caches.open("wanewright-pages-2")).keys()).length);
  await expect.poll(kept, { timeout: 60_000 }).toBe(7);
  await expectAccessible(page);
  await expectNoSidewaysScroll(page);
}, 180_000);

it("takes a day's work in aeroplane mode, through a kill and a restart", async () => {
  await phone.close();
  await switchOn(true);
  await openToday();
  await page.getByRole("button", { name: "Start the round" }).click();
  for (const n of [0, 1, 2]) await log(stopAt(n), n, stopAt(n).plausibleMv - 3);
  for (const n of [3, 4, 5]) await swap(stopAt(n), n);
  // Killed in the middle of an entry: what was kept stays, what was being typed is gone.
  await stopLink(6).click();
  await page.getByRole("link", { name: "Swap the pack" }).first().click();
  await phone.close();
  await switchOn(true);
  await openToday();
  expect(await page.getByRole("status").first().textContent()).toContain("7 entries kept");
  for (const n of [6, 7, 8, 9]) await swap(stopAt(n), n);
  await stopLink(10).click();
  await page.getByRole("link", { name: "Can’t do it today" }).click();
  await expectAccessible(page);
  await page.getByRole("button", { name: "Flooded" }).click();
  await page.getByRole("button", { name: "Keep this" }).click();
  await stopLink(10).filter({ hasText: "flooded" }).waitFor();
  await stopLink(11).click();
  await expectAccessible(page);
  await page.getByRole("button", { name: "Leave: done here" }).click();
  await page.reload();
  await page.getByText("This stop is done.").waitFor();
  const rows = await scenario.db
    .selectFrom("syncEntry")
    .select("id")
    .where("personId", "=", scenario.personId)
    .where("receivedAt", ">=", startedAt)
    .execute();
  expect(rows, "nothing has been sent").toEqual([]);
}, 240_000);

it("brings everything home once, though requests fail and repeat", async () => {
  let turn = 0;
  let calls = 0;
  await phone.route("**/api/sync", async (route) => {
    calls += 1;
    // A fixed pattern: of ten calls two never leave, one loses its answer, all others go twice.
    const fate = turn++ % 10;
    if (fate === 0 || fate === 4) return route.abort("connectionreset");
    const first = await route.fetch();
    if (fate === 1) return route.abort("connectionreset");
    expect(first.status()).toBe(200);
    return route.fulfill({ response: await route.fetch() });
  });
  await phone.setOffline(false);
  await page.goto(productUrl("/outbox"));
  await page.getByText("Everything has been sent.").waitFor({ timeout: 120_000 });
  expect(calls).toBeGreaterThanOrEqual(3);
  await expectDatabase();
}, 240_000);

async function expectDatabase(): Promise<void> {
  const { db, personId, stops } = scenario;
  const readings = await db
    .selectFrom("reading")
    .select(["packId", "millivolts"])
    .where("personId", "=", personId)
    .where("receivedAt", ">=", startedAt)
    .execute();
  const pair = (packId: string, millivolts: number) => `${packId} ${millivolts}`;
  expect(readings.map((r) => pair(r.packId, r.millivolts)).sort()).toEqual(
    logged.map((stop) => pair(stop.packId, stop.plausibleMv)).sort(),
  );
  const packs = await db
    .selectFrom("pack")
    .select(["assetId", "lotId", "removedAt"])
    .where(
      "lotId",
      "in",
      stops.map((stop) => stop.lotId),
    )
    .execute();
  expect(packs.map((p) => `${p.assetId} ${p.lotId} ${p.removedAt}`).sort()).toEqual(
    swapped.map((stop) => `${stop.assetId} ${stop.lotId} null`).sort(),
  );
  const old = await db
    .selectFrom("pack")
    .select(["id", "voltageOutMv"])
    .where("removedBy", "=", personId)
    .where(
      "id",
      "in",
      stops.map((stop) => stop.packId),
    )
    .execute();
  expect(old.map((p) => pair(p.id, p.voltageOutMv ?? 0)).sort()).toEqual(
    swapped.map((stop) => pair(stop.packId, stop.plausibleMv)).sort(),
  );
  const left = await db
    .selectFrom("lotStock")
    .select(["lotId", "cells"])
    .where("placeId", "=", scenario.vanPlaceId)
    .execute();
  const used = new Set(swapped.map((stop) => stop.lotId));
  for (const { lotId, cells } of stops) {
    const there = left.find((row) => row.lotId === lotId)?.cells ?? 0;
    expect(there, `cells of ${lotId} in the van`).toBe(used.has(lotId) ? 0 : cells);
  }
  const states = await db
    .selectFrom("stop")
    .select(["state", "cannotReason"])
    .where("roundId", "=", scenario.roundId)
    .orderBy("position")
    .execute();
  expect(states.map((stop) => stop.state)).toEqual([
    ...["planned", "planned", "planned"],
    ...["done", "done", "done", "done", "done", "done", "done"],
    ...["cannot_do", "done"],
  ]);
  expect(states[10]?.cannotReason).toBe("flooded");
}

it("never sends one person's entries as another's", async () => {
  await phone.unroute("**/api/sync");
  await openToday();
  await phone.setOffline(true);
  await log(stopAt(0), 0, stopAt(0).plausibleMv - 5);
  await phone.clearCookies();
  await phone.setOffline(false);
  await signInAs("technician2@quillmere.example");
  await page.getByText("of another person wait").waitFor();
  const others = () =>
    scenario.db
      .selectFrom("syncEntry")
      .innerJoin("person", "person.id", "syncEntry.personId")
      .select("syncEntry.id")
      .where("person.email", "=", "technician2@quillmere.example")
      .where("syncEntry.receivedAt", ">=", startedAt)
      .execute();
  expect(await others()).toEqual([]);
  await phone.clearCookies();
  await signInAs(scenario.email);
  const sent = () =>
    scenario.db
      .selectFrom("reading")
      .select("id")
      .where("personId", "=", scenario.personId)
      .where("receivedAt", ">=", startedAt)
      .execute();
  await expect.poll(async () => (await sent()).length, { timeout: 30_000 }).toBe(4);
  expect(await others()).toEqual([]);
}, 180_000);

async function signInAs(email: string): Promise<void> {
  await page.goto(productUrl("/sign-in?from=/today"));
  await page.getByLabel("Mail address").fill(email);
  await page.getByLabel("Password", { exact: true }).fill(accounts[0]?.password ?? "");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.getByRole("button", { name: "Load again" }).waitFor({ timeout: 60_000 });
}

it("said nothing to the console that it should not have", () => {
  // Requests that were cut off or signed out on purpose are told by the browser itself.
  const meant = /net::ERR_|status of 401/;
  expect(errors.filter((text) => !meant.test(text))).toEqual([]);
});
