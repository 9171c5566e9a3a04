/**
 * The office's story in the built product: what is due, next week's rounds built, a visit
 * moved, published; the technicians' mails with their calendar files; the supervisor's digest.
 */
import ICAL from "ical.js";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { connect } from "@/db/client";
import { transactionalJobs } from "@/lib/server/jobs";
import type { Mail } from "../../scripts/mail-fake/mailbox";
import { mailUrl, openBrowser, openPage, productUrl, signIn } from "../support/browser";

const db = connect(process.env.DATABASE_URL ?? "", { max: 2 });
let browser: Browser;
let watched: Awaited<ReturnType<typeof openPage>>;
let page: Page;

beforeAll(async () => {
  browser = await openBrowser();
  watched = await openPage(browser, "desktop");
  page = watched.page;
  await signIn(page, "dispatcher");
});
afterAll(async () => {
  await browser.close();
  await db.destroy();
});

async function mails(): Promise<Mail[]> {
  return (await (await fetch(mailUrl("/_mails"))).json()) as Mail[];
}

async function until<T>(read: () => Promise<T>, holds: (value: T) => boolean): Promise<T> {
  for (let waited = 0; ; waited += 500) {
    const value = await read();
    if (holds(value) || waited > 60_000) return value;
    await new Promise((resolve) => setTimeout(resolve, 500));
  }
}

describe("a dispatcher", () => {
  it("sees which packs of the fleet reach cut-off and when", async () => {
    await page.goto(productUrl("/horizon"));
    const table = page.getByRole("table", { name: /Packs in service/ });
    expect(await table.getByRole("row").count()).toBeGreaterThan(20);
    const shown = await table.getByRole("row").nth(1).innerText();
    expect(shown).toMatch(/out|%/);
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
    const before = (await mails()).length;
    await page.goto(productUrl("/rounds"));
    await page.getByRole("link", { name: /Week after/ }).click();
    await page.waitForURL(/week=/);
    await page.getByRole("button", { name: "Build rounds" }).click();
    const dialog = page.getByRole("dialog", { name: "Build rounds" });
    await dialog.getByRole("button", { name: "Build", exact: true }).click();
    await page.getByRole("button", { name: "Discard draft" }).waitFor({ timeout: 90_000 });
    expect(await page.getByRole("button", { name: /proposed$/ }).count()).toBeGreaterThan(1);
    expect((await mails()).length).toBe(before);
  });

  it("moves a stop to another day and sees the price before, and can undo it", async () => {
    const panel = page.getByRole("complementary", { name: "Chosen round" });
    await panel.getByRole("button", { name: /^Move/ }).first().click();
    const offers = page.getByRole("button", { name: /^Put it here/ });
    await offers.first().waitFor();
    expect(await offers.first().getAttribute("aria-label")).toMatch(/Whole plan/);
    await offers.first().click();
    await page.getByTitle("Undo moving a stop").waitFor();
  });

  it("publishes: each technician concerned gets a mail with a calendar file", async () => {
    await page.getByRole("button", { name: /^Publish \d+ rounds?$/ }).click();
    const dialog = page.getByRole("dialog", { name: /^Publish/ });
    await dialog.getByRole("button", { name: "Publish and send" }).click();
    // Site contacts are told as well: their mails carry no calendar file.
    const isRound = (mail: Mail) => mail.attachments.some((a) => a.filename === "round.ics");
    const round = (await until(mails, (all) => all.some(isRound))).find(isRound);
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
    await page.waitForLoadState("networkidle");
    expect(await page.locator(".rbc-event").count()).toBeGreaterThan(0);
    expect(watched.errors).toEqual([]);
    expect(watched.strayed).toEqual([]);
  });
});

describe("a supervisor", () => {
  it("gets the digest on the chosen day and hour", async () => {
    const person = await db
      .selectFrom("person")
      .select("id")
      .where("email", "=", "supervisor@quillmere.example")
      .executeTakeFirstOrThrow();
    const choice = { weekdays: [1, 2, 3, 4, 5, 6, 7], sendAt: "00:00", lastSentOn: null };
    await db
      .insertInto("digestSetting")
      .values({ personId: person.id, ...choice })
      .onConflict((conflict) => conflict.column("personId").doUpdateSet(choice))
      .execute();
    await transactionalJobs.enqueue(db, "digests", {});
    const sent = await until(mails, (all) => all.some((m) => /due in \d+ days/.test(m.subject)));
    const digest = sent.find((mail) => /due in \d+ days/.test(mail.subject));
    expect(digest?.text).toContain("Open the Horizon");
  });
});
