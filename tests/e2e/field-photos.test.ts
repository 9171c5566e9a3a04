/**
 * Photos, order, load and notes taken without signal, sent when it returns though requests fail and
 * repeat, and what the office then sees. The truth is what the test entered: it is compared with the
 * rows of PostgreSQL and the bytes that are served, read past the product's own words. What a JPEG
 * carries besides the picture is looked for in its bytes (ITU-T T.81 B.2.4.6, CIPA DC-008).
 */
import { randomUUID } from "node:crypto";
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { type BrowserContext, chromium, type Page } from "playwright-core";
import sharp from "sharp";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import accounts from "../../scripts/seed/demo-accounts.json";
import {
  expectAccessible,
  expectNoSidewaysScroll,
  openBrowser,
  openPage,
  productUrl,
  signIn,
  withoutBackgroundSync,
} from "../support/browser";
import { type FieldScenario, fieldScenario } from "../support/field-scenario";

const profile = mkdtempSync(join(tmpdir(), "wanewright-photos-"));
const SECRET = "Fen camera 52.5N";
const startedAt = new Date();
let scenario: FieldScenario;
let phone: BrowserContext;
let page: Page;

async function switchOn(offline: boolean): Promise<void> {
  phone = await chromium.launchPersistentContext(profile, {
    executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
    viewport: { width: 360, height: 740 },
    hasTouch: true,
    locale: "en-GB",
    args: [
      ...["--headless", "--no-sandbox", "--disable-gpu", "--no-first-run"],
      ...["--disable-background-networking", "--disable-component-update", "--disable-sync"],
    ],
  });
  await phone.setOffline(offline);
  page = phone.pages()[0] ?? (await phone.newPage());
  await withoutBackgroundSync(page);
}

beforeAll(async () => {
  scenario = await fieldScenario(process.env.DATABASE_URL ?? "", 4);
  await switchOn(false);
}, 240_000);

afterAll(async () => {
  await phone?.close();
  await scenario?.db.destroy();
  rmSync(profile, { recursive: true, force: true });
});

/** A photo as a phone's camera makes it: large, and telling where it was taken. */
async function cameraPhoto(): Promise<{ name: string; mimeType: string; buffer: Buffer }> {
  const noise = { type: "gaussian" as const, mean: 120, sigma: 30 };
  const size = { width: 2400, height: 1800 };
  const buffer = await sharp({ create: { ...size, channels: 3, background: "#777", noise } })
    .withExif({ IFD0: { Make: SECRET }, IFD3: { GPSAreaInformation: SECRET } })
    .jpeg({ quality: 90 })
    .toBuffer();
  return { name: "IMG_0001.jpg", mimeType: "image/jpeg", buffer };
}

const stopLink = (n: number) => page.getByRole("list", { name: "Stops" }).getByRole("link").nth(n);
const addPhoto = async () => {
  await page.locator('input[type="file"]').setInputFiles(await cameraPhoto());
  await page.getByRole("button", { name: "Remove photo 1" }).waitFor();
};
const photos = () =>
  scenario.db
    .selectFrom("photo")
    .selectAll()
    .where("personId", "=", scenario.personId)
    .where("receivedAt", ">=", startedAt)
    .orderBy("takenAt")
    .execute();

async function signInOnPhone(): Promise<void> {
  await page.goto(productUrl("/sign-in?from=/today"));
  await page.getByLabel("Mail address").fill(scenario.email);
  await page.getByLabel("Password", { exact: true }).fill(accounts[0]?.password ?? "");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await stopLink(3).waitFor({ timeout: 60_000 });
}

it("takes photos, notes, an order and a load check in aeroplane mode, through a kill", async () => {
  await signInOnPhone();
  const kept = async () =>
    page.evaluate(async () => (await (await caches.open("wanewright-pages-2")).keys()).length);
  await expect.poll(kept, { timeout: 90_000 }).toBe(7);
  await phone.close();
  await switchOn(true);
  await page.goto(productUrl("/today"));
  await stopLink(0).click();
  await page.getByRole("link", { name: "Can’t do it today" }).click();
  await page.getByRole("button", { name: "Flooded" }).click();
  await addPhoto();
  await expectAccessible(page);
  await expectNoSidewaysScroll(page);
  await page.getByRole("button", { name: "Keep this" }).click();
  await stopLink(0).filter({ hasText: "flooded" }).waitFor();
  await stopLink(1).click();
  await page.getByRole("button", { name: "Note or photo" }).click();
  await page.getByLabel("What you see here").fill("Gate hinge broken");
  await addPhoto();
  await page.getByRole("button", { name: "Keep for the office" }).click();
  await page.getByText("Kept for the office.").waitFor();
  await phone.close();
  await switchOn(true);
  await page.goto(productUrl("/today"));
  await stopLink(0).waitFor();
  expect(await page.getByRole("status").first().textContent()).toContain("2 photos");
  await changeOrder();
  await checkLoad();
  expect(await photos()).toEqual([]);
}, 240_000);

async function changeOrder(): Promise<void> {
  await page.getByRole("button", { name: "Change the order" }).click();
  await expectAccessible(page);
  const open = page.getByRole("list", { name: "Open stops" });
  await open
    .getByRole("button", { name: /^Later/ })
    .first()
    .click();
  await page.getByRole("button", { name: "Keep this order" }).click();
  await page.getByText("In your own order").waitFor();
}

async function checkLoad(): Promise<void> {
  await page.getByRole("button", { name: "Check the load" }).click();
  const less = page.getByRole("button", { name: /^One less/ }).first();
  while (await less.isEnabled()) await less.click();
  await page.getByText("With this you can do").waitFor();
  await expectAccessible(page);
  await page.getByRole("button", { name: "Tell the office what is short" }).click();
  await page.getByText("The office is told").waitFor();
}

it("brings them home once, though requests fail and repeat", async () => {
  let turn = 0;
  await phone.route(/\/api\/sync/, async (route) => {
    const fate = turn++ % 4;
    if (fate === 0) return route.abort("connectionreset");
    const first = await route.fetch();
    if (fate === 2) return route.abort("connectionreset");
    return route.fulfill({ response: first.ok() ? await route.fetch() : first });
  });
  await phone.setOffline(false);
  await page.goto(productUrl("/outbox"));
  await page.getByText("Everything has been sent.").waitFor({ timeout: 120_000 });
  const rows = await photos();
  expect(rows).toHaveLength(2);
  // Of 2400 by 1800 the phone keeps 1600 at the longer edge.
  for (const { width, height } of rows) expect([width, height]).toEqual([1600, 1200]);
  const stops = await scenario.db
    .selectFrom("stop")
    .select("id")
    .where("roundId", "=", scenario.roundId)
    .orderBy("position")
    .execute();
  const [a, b, c, d] = scenario.stops.map((stop) => stop.id);
  expect(stops.map((stop) => stop.id)).toEqual([a, c, b, d]);
  await phone.unroute(/\/api\/sync/);
}, 240_000);

describe("the office", () => {
  it("sees what needs a decision, decides, and finds the photos at the asset", async () => {
    const browser = await openBrowser();
    const office = await openPage(browser, "desktop");
    try {
      await signIn(office.page, "dispatcher");
      await office.page.goto(productUrl("/rounds"));
      await office.page.getByRole("link", { name: /From the field/ }).click();
      await office.page.getByText("Could not be done").first().waitFor();
      await office.page.getByText("Short at the load check").first().waitFor();
      await expectAccessible(office.page);
      const flooded = office.page.getByRole("listitem").filter({ hasText: "flooded" }).first();
      expect(await flooded.getByRole("img").count()).toBeGreaterThan(0);
      await flooded.getByRole("button", { name: /^Plan again/ }).click();
      await office.page.getByRole("button", { name: "Leave it to the next plan" }).click();
      await office.page.getByText("left to the next plan").first().waitFor();
      await office.page.goto(productUrl(`/fleet/${scenario.stops[1]?.tag ?? ""}`));
      await office.page.getByText("Gate hinge broken").first().waitFor();
      const shown = office.page.getByRole("img", { name: /^Photo 1/ }).first();
      await expect
        .poll(() => shown.evaluate((img: HTMLImageElement) => img.naturalWidth), {
          timeout: 20_000,
        })
        .toBeGreaterThan(0);
      await expectAccessible(office.page);
      expect(office.errors).toEqual([]);
    } finally {
      await browser.close();
    }
  }, 180_000);
});

describe("the photos' address", () => {
  const put = (bytes: Buffer, id: string = randomUUID()) =>
    page.evaluate(
      async ({ id: photo, entry, person, data }) => {
        const now = new Date().toISOString();
        const query = new URLSearchParams({ entry, person, taken: now, sent: now });
        const body = Uint8Array.from(atob(data), (letter) => letter.charCodeAt(0));
        const url = `/api/sync/photos/${photo}?${query}`;
        // What is far too large may be cut off before it is answered.
        const answer = await fetch(url, { method: "PUT", body }).catch(() => null);
        return answer?.status ?? "cut off";
      },
      { id, entry: entryId, person: scenario.personId, data: bytes.toString("base64") },
    );
  let entryId = "";

  it("serves them without anything but the picture, and to nobody unknown", async () => {
    const [row] = await photos();
    entryId = row?.entryId ?? "";
    const url = `/api/v1/photos/${row?.id}`;
    const data = await page.evaluate(async (path) => {
      const bytes = new Uint8Array(await (await fetch(path)).arrayBuffer());
      return btoa(Array.from(bytes, (byte) => String.fromCharCode(byte)).join(""));
    }, url);
    const bytes = Buffer.from(data, "base64");
    expect(bytes.subarray(0, 3)).toEqual(Buffer.from([0xff, 0xd8, 0xff]));
    expect(bytes.includes("Exif")).toBe(false);
    expect(bytes.includes(SECRET)).toBe(false);
    expect((await fetch(productUrl(url), { redirect: "manual" })).status).toBe(401);
  });

  it("takes no drawing with script, nothing huge, nothing that is no picture", async () => {
    const svg = '<svg xmlns="http://www.w3.org/2000/svg"><script>alert(1)</script></svg>';
    expect(await put(Buffer.from(svg))).toBe(422);
    expect([413, "cut off"]).toContain(await put(Buffer.alloc(8_000_001, 1)));
    expect(await put(Buffer.alloc(0))).toBe(422);
    expect(await put((await cameraPhoto()).buffer, "no-id")).toBe(422);
    expect(await photos()).toHaveLength(2);
  });
});

it("the browser sends without the page, where it can", async () => {
  // This page has Background Sync, and none of its own requests gets through.
  const other = await phone.newPage();
  await other.route(/\/api\//, (route) => route.abort());
  await other.goto(productUrl("/today"));
  await other.getByRole("list", { name: "Stops" }).getByRole("link").nth(1).click();
  await other.getByRole("button", { name: "Note or photo" }).click();
  await other.getByLabel("What you see here").fill("Sent by the browser");
  await other.getByRole("button", { name: "Keep for the office" }).click();
  await other.getByText("Kept for the office.").waitFor();
  await other.close();
  await expect
    .poll(async () => JSON.stringify(await notes()), { timeout: 60_000 })
    .toContain("Sent by the browser");
}, 120_000);

const notes = () =>
  scenario.db
    .selectFrom("syncEntry")
    .select("body")
    .where("personId", "=", scenario.personId)
    .where("kind", "=", "note")
    .where("receivedAt", ">=", startedAt)
    .execute();

it("signing out takes the day off the phone and keeps what is not sent", async () => {
  await page.goto(productUrl("/today"));
  await stopLink(2).click();
  await phone.setOffline(true);
  await page.getByRole("button", { name: "Note or photo" }).click();
  await page.getByLabel("What you see here").fill("Kept for later");
  await page.getByRole("button", { name: "Keep for the office" }).click();
  await page.getByText("Kept for the office.").waitFor();
  await phone.route(/\/api\/sync/, (route) => route.abort());
  await phone.setOffline(false);
  await page.getByRole("link", { name: "Back to the round" }).click();
  await page.getByRole("button", { name: /^Sign out/ }).click();
  await page.getByRole("button", { name: /^Sign out all the same/ }).click();
  await page.getByText("kept safe on this phone").waitFor({ timeout: 30_000 });
  await expectAccessible(page);
  await phone.setOffline(true);
  const left = await page.goto(productUrl("/today")).catch(() => null);
  expect(left, "no page of the day is left on the phone").toBeNull();
  await phone.unroute(/\/api\/sync/);
  await phone.setOffline(false);
  await signInOnPhone();
  await expect
    .poll(async () => JSON.stringify(await notes()), { timeout: 30_000 })
    .toContain("Kept for later");
}, 180_000);
