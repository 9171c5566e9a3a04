/**
 * The Rounds screen in the built product: the map and the board pick out the same round and stop,
 * by mouse and by keyboard; the improvement runs in the worker, shows its curve, can be left and
 * stopped, never ends dearer than it began, and can be undone.
 */
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { connect } from "@/db/client";
import { openBrowser, openPage, productUrl, signIn } from "../support/browser";

const db = connect(process.env.DATABASE_URL ?? "", { max: 2 });
const PATIENCE_MS = 120_000;
/** A busy machine redraws late. */
const PATIENT = { timeout: 20_000 };
let browser: Browser;
let watched: Awaited<ReturnType<typeof openPage>>;
let page: Page;
let planId: string;
const began = new Date();

beforeAll(async () => {
  browser = await openBrowser();
  watched = await openPage(browser, "desktop");
  page = watched.page;
  page.setDefaultTimeout(30_000);
  await signIn(page, "dispatcher");
  await page.goto(productUrl("/rounds"));
  // three weeks on, where no other story plans
  for (let week = 0; week < 3; week += 1) {
    const before = page.url();
    await page.getByRole("link", { name: /Week after/ }).click();
    await page.waitForURL((url) => url.href !== before);
  }
  await page.getByRole("button", { name: "Build rounds" }).click();
  const dialog = page.getByRole("dialog", { name: "Build rounds" });
  await dialog.getByRole("button", { name: "Build", exact: true }).click();
  await drafted();
  const plan = await db
    .selectFrom("plan")
    .select("id")
    .where("createdAt", ">", began)
    .where("state", "=", "draft")
    .orderBy("createdAt", "desc")
    .executeTakeFirstOrThrow();
  planId = plan.id;
}, 240_000);

afterAll(async () => {
  await browser.close();
  await db.deleteFrom("plan").where("createdAt", ">", began).execute();
  await db.destroy();
});

const drafted = () =>
  page.getByRole("button", { name: "Discard draft" }).waitFor({ timeout: PATIENCE_MS });
const panel = () => page.getByRole("complementary", { name: "Chosen round" });
const numbered = (number: number) => panel().getByTitle(new RegExp(`^${number}\\. `));
const chosenOnMap = () =>
  panel()
    .getByTitle(/, chosen$/)
    .getAttribute("title");
/** Names of stops are pressed where they are picked out; locks have pressed buttons of their own. */
const lit = () => panel().locator('ol > li > span button[aria-pressed="true"]');

/** Every visit of the plan with its technician, day and place in the round. */
async function visits(): Promise<string[]> {
  const rows = await db
    .selectFrom("stop")
    .innerJoin("round", "round.id", "stop.roundId")
    .select(["round.technicianId", "round.day", "stop.position", "stop.siteId"])
    .where("round.planId", "=", planId)
    .execute();
  return rows.map((r) => `${r.technicianId} ${r.day} ${r.position} ${r.siteId}`).sort();
}

async function progress(): Promise<{ state: string; costs: readonly number[] }> {
  const { state, progress: noted } = await db
    .selectFrom("plan")
    .select(["state", "progress"])
    .where("id", "=", planId)
    .executeTakeFirstOrThrow();
  return { state, costs: (noted as { costs?: number[] } | null)?.costs ?? [] };
}

describe("the map and the board", () => {
  it("a stop clicked on the map is picked out in the list", async () => {
    await numbered(2).click();
    const second = panel().locator("ol > li").nth(1).getByRole("button").first();
    await expect.poll(() => second.getAttribute("aria-pressed"), PATIENT).toBe("true");
    expect(await lit().count()).toBe(1);
    expect(await chosenOnMap()).toBe(`2. ${await second.innerText()}, chosen`);
  });

  it("a stop chosen in the list, by keyboard, is picked out on the map", async () => {
    const first = panel().locator("ol > li").first().getByRole("button").first();
    await first.focus();
    await page.keyboard.press("Enter");
    await expect.poll(chosenOnMap, PATIENT).toBe(`1. ${await first.innerText()}, chosen`);
    expect(await lit().count()).toBe(1);
  });

  it("a stop reached on the map by keyboard is picked out in the list and keeps the focus", async () => {
    await numbered(2).focus();
    await page.keyboard.press("Enter");
    const second = panel().locator("ol > li").nth(1).getByRole("button").first();
    await expect.poll(() => second.getAttribute("aria-pressed"), PATIENT).toBe("true");
    const focused = await page.evaluate(() => document.activeElement?.getAttribute("title"));
    expect(focused).toBe(`2. ${await second.innerText()}, chosen`);
  });

  it("a stop of another round, clicked on the map, chooses that round on the board", async () => {
    const chosen = page.locator('td button[aria-pressed="true"]');
    const before = await chosen.getAttribute("aria-label");
    const other = panel()
      .getByTitle(/, \w{3} \d+ \w{3,4} · /)
      .first();
    const [site] = ((await other.getAttribute("title")) ?? "").split(", ");
    await other.dispatchEvent("click");
    await expect.poll(() => chosen.getAttribute("aria-label"), PATIENT).not.toBe(before);
    expect(await lit().innerText()).toBe(site);
  });
});

describe("improving", () => {
  it("runs in the worker with its curve, can be left, is stopped and keeps the best", async () => {
    const before = await visits();
    await page.getByRole("button", { name: "Improve" }).click();
    const stop = page.getByRole("button", { name: "Stop, keep the best" });
    await stop.waitFor();
    // leave, and come back
    await page.goto(productUrl("/stores"));
    await page.goto(productUrl(`/rounds?plan=${planId}`));
    const seen = await progress();
    if (seen.state === "building") await stop.click().catch(() => undefined);
    await drafted();
    const { costs } = await progress();
    expect(costs.length).toBeGreaterThan(0);
    expect(costs.every((cost, i) => i === 0 || cost <= (costs[i - 1] ?? 0))).toBe(true);
    expect((await visits()).length).toBeGreaterThan(0);
    const kept = await visits();
    await page.getByTitle("Undo the improvement").click();
    await expect.poll(visits, PATIENT).toEqual(before);
    expect(kept.length).toBeGreaterThan(0);
    expect(watched.errors).toEqual([]);
  }, 240_000);
});
