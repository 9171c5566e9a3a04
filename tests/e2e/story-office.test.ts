/**
 * The dispatcher's story in the built product, at a desk and on a phone: what is due, a week's
 * rounds built, a visit moved, published; the technicians' mails with their calendar files. The
 * calendar file is read back by an independent RFC 5545 parser.
 */
import ICAL from "ical.js";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { connect } from "@/db/client";
import type { Mail } from "../../scripts/mail-fake/mailbox";
import {
  expectNoSidewaysScroll,
  openBrowser,
  openPage,
  productUrl,
  signIn,
  type Size,
} from "../support/browser";
import { mails, settledMails, until } from "../support/mailbox";

const SIZES: readonly Size[] = ["desktop", "phone"];
const db = connect(process.env.DATABASE_URL ?? "", { max: 2 });
let browser: Browser;

beforeAll(async () => {
  browser = await openBrowser();
});
afterAll(async () => {
  await browser.close();
  await db.destroy();
});

describe.each(SIZES)("a dispatcher at %s size", (size) => {
  let watched: Awaited<ReturnType<typeof openPage>>;
  let page: Page;
  let before: readonly Mail[];
  let began: Date;

  beforeAll(async () => {
    began = new Date();
    watched = await openPage(browser, size);
    page = watched.page;
    before = await mails();
    await signIn(page, "dispatcher");
  });
  /** The next size finds the week as this one found it: with all its work still to be planned. */
  afterAll(async () => {
    await watched.context.close();
    await db.deleteFrom("plan").where("createdAt", ">", began).execute();
  });

  /** Round mails of this story: with a calendar file, which site contacts' mails do not carry. */
  const newRounds = (all: readonly Mail[]) =>
    all
      .filter((mail) => mail.attachments.some((a) => a.filename === "round.ics"))
      .filter((mail) => !before.some((old) => old.id === mail.id));

  it("sees which packs of the fleet reach cut-off and when", async () => {
    await page.goto(productUrl("/horizon"));
    const table = page.getByRole("table", { name: /Packs in service/ });
    expect(await table.getByRole("row").count()).toBeGreaterThan(20);
    const shown = await table.getByRole("row").nth(1).innerText();
    expect(shown).toMatch(/out|%/);
    await expectNoSidewaysScroll(page);
    await page.getByRole("link", { name: "Next year" }).click();
    await page.waitForURL(/within=365/);
    await page.getByLabel("Search by tag, name or site").fill("no such thing");
    await page.keyboard.press("Enter");
    await page.getByText("No pack reaches cut-off here.").waitFor();
  });

  it("takes what is shown away as CSV", async () => {
    const answer = await watched.context.request.get(
      productUrl("/api/v1/exports/horizon?within=30"),
    );
    expect(answer.headers()["content-type"]).toContain("text/csv");
    const lines = (await answer.text()).trim().split("\r\n");
    expect(lines[0]).toContain("cut-off likely");
    expect(lines.length).toBeGreaterThan(5);
  });

  it("builds next week's rounds; nothing is sent by that", async () => {
    await page.goto(productUrl("/rounds"));
    await page.getByRole("link", { name: /Week after/ }).click();
    await page.waitForURL(/week=/);
    const sent = (await settledMails()).length;
    await page.getByRole("button", { name: "Build rounds" }).click();
    const dialog = page.getByRole("dialog", { name: "Build rounds" });
    await dialog.getByRole("button", { name: "Build", exact: true }).click();
    await page.getByRole("button", { name: "Discard draft" }).waitFor({ timeout: 90_000 });
    expect(await page.getByRole("button", { name: /proposed$/ }).count()).toBeGreaterThan(1);
    expect((await mails()).length).toBe(sent);
    await expectNoSidewaysScroll(page);
  });

  it("moves a stop to another day, sees the price before, and could undo it", async () => {
    const panel = page.getByRole("complementary", { name: "Chosen round" });
    await panel.getByRole("button", { name: /^Move/ }).first().click();
    const offer = page.getByRole("button", { name: /^Put it here/ }).first();
    await offer.waitFor();
    expect(await offer.getAttribute("aria-label")).toMatch(/Whole plan/);
    // The places stand on the board: it must have come into view by itself.
    await expect.poll(() => onScreen(page, "Put it back")).toBe(true);
    await offer.click();
    await page.getByTitle("Undo moving a stop").waitFor();
  });

  it("publishes: each technician concerned gets a mail with a calendar file", async () => {
    // Mails of the other size's rounds may have come in since this one began.
    const known = new Set((await mails()).map((mail) => mail.id));
    const fresh = async () => newRounds(await mails()).filter((mail) => !known.has(mail.id));
    await page.getByRole("button", { name: /^Publish \d+ rounds?$/ }).click();
    const dialog = page.getByRole("dialog", { name: /^Publish/ });
    await dialog.getByRole("button", { name: "Publish and send" }).click();
    const round = (await until(fresh, (all) => all.length > 0))[0];
    expect(round?.text).toMatch(/stops?/);
    const ics = Buffer.from(round?.attachments[0]?.content ?? "", "base64").toString("utf8");
    const event = new ICAL.Event(
      new ICAL.Component(ICAL.parse(ics)).getFirstSubcomponent("vevent")!,
    );
    expect(event.uid).toBeTruthy();
    expect(event.endDate.compare(event.startDate)).toBe(1);
    const rows = await db
      .selectFrom("round")
      .select("icalUid")
      .where("state", "=", "published")
      .execute();
    expect(rows.map((row) => row.icalUid)).toContain(event.uid);
  });

  it("finds the published visits on the calendar", async () => {
    await page.goto(productUrl("/calendar"));
    await page.locator(".rbc-event").first().waitFor();
    expect(await page.locator(".rbc-event").count()).toBeGreaterThan(0);
    await expectNoSidewaysScroll(page);
    expect(watched.errors).toEqual([]);
    expect(watched.strayed).toEqual([]);
  });
});

async function onScreen(page: Page, words: string): Promise<boolean> {
  const box = await page.getByText(words).boundingBox();
  const height = page.viewportSize()?.height ?? 0;
  return box !== null && box.y >= 0 && box.y + box.height <= height;
}
