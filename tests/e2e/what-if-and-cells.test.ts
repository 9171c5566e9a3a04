/**
 * What if, which cell, findings and readings in doubt on the seeded scenario, at desktop and phone
 * size: driven as a dispatcher does, looked at as a supervisor may. The facts stand in the
 * scenario (one weak LR6 lot, RG1's firmware); the order of sizes is common practice, no source.
 */
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { connect } from "@/db/client";
import {
  expectAccessible,
  expectNoSidewaysScroll,
  openBrowser,
  openPage,
  productUrl,
  signIn,
  type Size,
} from "../support/browser";

const db = connect(process.env.DATABASE_URL ?? "", { max: 2 });
let browser: Browser;
let tag: string;
let modelId: string;

beforeAll(async () => {
  browser = await openBrowser();
  const row = await db
    .selectFrom("asset")
    .innerJoin("pack", "pack.assetId", "asset.id")
    .innerJoin("cellType", "cellType.id", "pack.cellTypeId")
    .innerJoin("forecast", "forecast.packId", "pack.id")
    .select(["asset.tag", "asset.deviceModelId"])
    .where("asset.tag", "like", "SP1-%")
    .where("cellType.designation", "=", "LR6")
    .where("pack.removedAt", "is", null)
    .where("forecast.outNowPermille", "<", 10)
    // Something was logged since it went in.
    .where(({ exists, selectFrom }) =>
      exists(selectFrom("reading").select("reading.id").whereRef("reading.packId", "=", "pack.id")),
    )
    .orderBy("forecast.shareLeftPermille", "desc")
    .executeTakeFirstOrThrow();
  tag = row.tag;
  modelId = row.deviceModelId;
});
afterAll(async () => {
  await browser.close();
  await db.destroy();
});

const counts = () =>
  Promise.all(
    (["reading", "drawMeasurement", "auditEntry"] as const).map((table) =>
      db
        .selectFrom(table)
        .select((eb) => eb.fn.countAll().as("n"))
        .executeTakeFirstOrThrow(),
    ),
  );

async function sound(page: Page) {
  await expectAccessible(page);
  await expectNoSidewaysScroll(page);
}

describe.each(["desktop", "phone"] as Size[])("a dispatcher at %s size", (size) => {
  let watched: Awaited<ReturnType<typeof openPage>>;
  let page: Page;
  beforeAll(async () => {
    watched = await openPage(browser, size);
    page = watched.page;
    await signIn(page, "dispatcher");
    await page.goto(productUrl(`/fleet/${tag}`), { waitUntil: "networkidle" });
  });
  afterAll(() => watched.context.close());

  const form = () => page.getByRole("form", { name: "What if" });
  const compare = () => form().getByRole("button", { name: "Compare" }).click();
  const answer = () => page.getByRole("region", { name: "Forecast as it is and what if" });

  it("reads on what the forecast rests and what moved it last", async () => {
    await page.getByText("What moved it last").waitFor();
    await page
      .getByText(/likely date (as before|.* (earlier|later))/)
      .first()
      .waitFor();
    await sound(page);
  });

  it("is told by its field what makes no sense, and keeps what was typed", async () => {
    await form().getByLabel("Voltage of the pack").fill("9.9");
    await compare();
    await page
      .getByText(/is more than this pack can show/)
      .first()
      .waitFor();
    expect(await form().getByLabel("Voltage of the pack").inputValue()).toBe("9.9");
  });

  it("sees both strips and dates side by side; nothing is kept", async () => {
    const before = await counts();
    await form().getByLabel("Voltage of the pack").fill("");
    await form()
      .getByLabel(/^Period, now/)
      .fill("5");
    await compare();
    await answer().waitFor();
    await page.getByText(/Likely cut-off .* earlier/).waitFor();
    expect(await answer().getByRole("img").count()).toBe(2);
    // A table on a desk, one above the other on a phone.
    expect(await answer().getByRole("row").count()).toBe(size === "desktop" ? 3 : 0);
    for (const label of ["As it is", "What if"]) {
      await answer().getByText(label, { exact: true }).filter({ visible: true }).waitFor();
    }
    await sound(page);
    expect(await counts()).toEqual(before);
  });

  it("compares other cells, and is told where that is decided", async () => {
    await form()
      .getByLabel(/^Period, now/)
      .fill("");
    await form().getByLabel("Had it run on").selectOption({ label: "FR6" });
    await compare();
    await page.getByText(/Likely cut-off .* later/).waitFor();
    await page.getByText(/choose FR6 when the swap is recorded/).waitFor();
    await form().getByLabel("Had it run on").selectOption("");
  });

  it("saves a supposed voltage by logging it", async () => {
    await form().getByLabel("Voltage of the pack").fill("4.20");
    await compare();
    await page.getByRole("button", { name: "Log this voltage" }).click();
    const dialog = page.getByRole("dialog");
    expect(await dialog.getByLabel("Voltage of the whole pack").inputValue()).toBe("4.2");
    if (size === "phone") return;
    await dialog.getByRole("button", { name: "Log it" }).click();
    await page.getByText(/^Logged/).waitFor();
    const [latest] = await db
      .selectFrom("reading")
      .innerJoin("pack", "pack.id", "reading.packId")
      .innerJoin("asset", "asset.id", "pack.assetId")
      .select("reading.millivolts")
      .where("asset.tag", "=", tag)
      .orderBy("reading.receivedAt", "desc")
      .limit(1)
      .execute();
    expect(latest?.millivolts).toBe(4200);
  });

  it("compares every cell for the asset and for its model", async () => {
    for (const path of [`/fleet/${tag}/cells`, `/fleet/models/${modelId}/cells`]) {
      await page.goto(productUrl(path), { waitUntil: "networkidle" });
      const table = page.getByRole("table", { name: /Cells that fit/ });
      const names = await table.getByRole("rowheader").allInnerTexts();
      // A larger cell of the same voltage lasts longer, so its year is cheaper: D, C, then AA.
      const order = names.map((name) => name.split(/\s/)[0]).filter((n) => n?.startsWith("LR"));
      expect(order).toEqual(["LR20", "LR14", "LR6"]);
      await table
        .getByText(/works the same, only longer/)
        .first()
        .waitFor();
      await page
        .getByText(/fresh, the pack rests at/)
        .first()
        .waitFor();
      await sound(page);
    }
  });

  it("finds the weak lot and the firmware of the scenario, and what to do", async () => {
    await page.goto(productUrl("/record/findings"), { waitUntil: "networkidle" });
    await page.getByRole("heading", { name: /^Weak lot LR6-/ }).waitFor();
    await page.getByRole("heading", { name: /^RG1 rain gauge draws \d+.% more/ }).waitFor();
    await page.getByText(/Firmware changed on \d+ of its assets/).waitFor();
    await sound(page);
  });

  it("sees readings in doubt with a way to judge each", async () => {
    await page.goto(productUrl("/record/readings"), { waitUntil: "networkidle" });
    const rows = page.getByRole("table", { name: /Readings in doubt/ }).getByRole("row");
    expect(await rows.count()).toBeGreaterThan(3);
    await sound(page);
    await page
      .getByRole("button", { name: /^Judge/ })
      .first()
      .click();
    await page.getByRole("dialog", { name: /^What to make of/ }).waitFor();
    expect(watched.errors).toEqual([]);
  });
});

describe("a supervisor", () => {
  it("may ask what if and read findings, and is offered no act", async () => {
    const { page, context } = await openPage(browser, "desktop");
    await signIn(page, "supervisor");
    await page.goto(productUrl(`/fleet/${tag}`), { waitUntil: "networkidle" });
    const form = page.getByRole("form", { name: "What if" });
    await form.getByLabel("Voltage of the pack").fill("4.1");
    await form.getByRole("button", { name: "Compare" }).click();
    await page.getByText("A dispatcher can record this.").waitFor();
    expect(await page.getByRole("button", { name: "Log this voltage" }).count()).toBe(0);
    await page.goto(productUrl("/record/findings"), { waitUntil: "networkidle" });
    expect(await page.getByRole("button", { name: /^Dismiss/ }).count()).toBe(0);
    await context.close();
  });
});
