/**
 * The supervisor's and the administrator's stories in the built product, at a desk and on a
 * phone: a digest chosen and sent, the Record read; a person invited, who takes it up.
 */
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { connect } from "@/db/client";
import { transactionalJobs } from "@/lib/server/jobs";
import {
  expectNoSidewaysScroll,
  openBrowser,
  openPage,
  productUrl,
  signIn,
  type Size,
} from "../support/browser";
import { mails, until } from "../support/mailbox";

const SIZES: readonly Size[] = ["desktop", "phone"];
const PASSWORD = "withy lantern culvert 9";
const db = connect(process.env.DATABASE_URL ?? "", { max: 2 });
let browser: Browser;

beforeAll(async () => {
  browser = await openBrowser();
});
afterAll(async () => {
  await browser.close();
  await db.destroy();
});

describe.each(SIZES)("a supervisor at %s size", (size) => {
  let watched: Awaited<ReturnType<typeof openPage>>;
  let page: Page;
  beforeAll(async () => {
    watched = await openPage(browser, size);
    page = watched.page;
    await signIn(page, "supervisor");
  });
  afterAll(() => watched.context.close());

  it("chooses the days of the own digest", async () => {
    await page.goto(productUrl("/settings/digests"));
    await page.getByRole("button", { name: /^Change the digest of/ }).click();
    const dialog = page.getByRole("dialog");
    for (const tick of await dialog.getByRole("checkbox").all()) await tick.check();
    await dialog.getByLabel("From").fill("00:00");
    await dialog.getByRole("button", { name: "Save" }).click();
    await dialog.waitFor({ state: "hidden" });
    await expectNoSidewaysScroll(page);
  });

  // A day's digest goes out once, so only one of the sizes can wait for it.
  it.runIf(size === SIZES[0])("gets the digest by mail", async () => {
    await db.updateTable("digestSetting").set({ lastSentOn: null }).execute();
    const isDigest = (mail: { to: readonly string[]; subject: string }) =>
      /due in \d+ days/.test(mail.subject) && String(mail.to).includes("supervisor@");
    const before = (await mails()).filter(isDigest).length;
    await transactionalJobs.enqueue(db, "digests", {});
    const sent = await until(mails, (all) => all.filter(isDigest).length > before);
    expect(sent.filter(isDigest).length).toBe(before + 1);
    expect(sent.find(isDigest)?.text).toContain("Open the Horizon");
  });

  it("reads in the Record whether dates can be trusted and what swapping cost", async () => {
    await page.goto(productUrl("/record"));
    await page.getByRole("heading", { name: "Can the dates be trusted?" }).waitFor();
    await page.getByText("Days found over days said").first().waitFor();
    await expectNoSidewaysScroll(page);
    await page.goto(productUrl("/record/costs"));
    expect(await page.getByRole("table").first().getByRole("row").count()).toBeGreaterThan(12);
    await expectNoSidewaysScroll(page);
    expect(watched.errors).toEqual([]);
  });

  it("may look at the calendar and move nothing", async () => {
    await page.goto(productUrl("/calendar"));
    await page.getByText("Your role can look, not move.").waitFor();
    await page.locator(".rbc-event").first().click();
    await page.getByText("This visit cannot be moved from here.").waitFor();
  });
});

describe.each(SIZES)("an administrator at %s size", (size) => {
  let watched: Awaited<ReturnType<typeof openPage>>;
  let page: Page;
  const email = `new-${size}@quillmere.example`;
  beforeAll(async () => {
    watched = await openPage(browser, size);
    page = watched.page;
    await signIn(page, "administrator");
  });
  afterAll(() => watched.context.close());

  it("invites a person; what is missing is said, and what was typed stays", async () => {
    await page.goto(productUrl("/settings/people"));
    await page.getByRole("button", { name: "Invite a person…" }).click();
    const dialog = page.getByRole("dialog", { name: "Invite a person" });
    await dialog.getByLabel("Name").fill("Wilma Reed");
    await dialog.getByLabel("Mail address").fill(email);
    await dialog.getByRole("button", { name: "Send the invitation" }).click();
    await dialog.getByText("Choose at least one role.").first().waitFor();
    expect(await dialog.getByLabel("Name").inputValue()).toBe("Wilma Reed");
    await dialog.getByLabel("Supervisor").check();
    await dialog.getByRole("button", { name: "Send the invitation" }).click();
    await dialog.waitFor({ state: "hidden" });
    await page.goto(productUrl("/settings/people?q=Wilma"));
    await expectNoSidewaysScroll(page);
    expect(watched.errors).toEqual([]);
  });

  it("and the person takes the invitation up from the mail", async () => {
    const all = await until(mails, (list) => list.some((mail) => String(mail.to).includes(email)));
    const mail = all.find((one) => String(one.to).includes(email));
    const link = /https?:\/\/\S+\/welcome\S*/.exec(mail?.text ?? "")?.[0] ?? "";
    expect(link).toContain("/welcome");
    const guest = await openPage(browser, size);
    await guest.page.goto(link);
    await guest.page.getByLabel("Password", { exact: true }).fill(PASSWORD);
    await guest.page.getByRole("button", { name: "Set the password and start" }).click();
    await guest.page.waitForURL(/horizon/);
    expect(guest.errors).toEqual([]);
    await guest.context.close();
  });
});
