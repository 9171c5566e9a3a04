/**
 * Every page, for each role that uses it, at desktop and at phone size: it answers, it says
 * its name once, axe finds nothing (WCAG 2.2 AA), nothing scrolls sideways, the console stays
 * silent and no request leaves the machine.
 */
import type { Browser } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import {
  type DemoRole,
  expectAccessible,
  expectNoSidewaysScroll,
  openBrowser,
  openPage,
  productUrl,
  signIn,
  type Size,
} from "../support/browser";

const OFFICE = [
  "/horizon",
  "/horizon?within=all&order=tag",
  "/rounds",
  "/calendar",
  "/map",
  "/fleet",
  "/fleet/sites",
  "/fleet/models",
  "/stores",
  "/stores/demand",
  "/stores/lots",
  "/stores/moves",
  "/stores/return-box",
  "/record",
  "/record/findings",
  "/record/readings",
  "/record/costs",
  "/record/policies",
];
const SETTINGS = [
  "/settings/organisation",
  "/settings/people",
  "/settings/crews",
  "/settings/api-keys",
  "/settings/climates",
  "/settings/mails",
  "/settings/audit",
];
const PAGES: readonly [role: DemoRole, size: Size, paths: readonly string[]][] = [
  ["dispatcher", "desktop", [...OFFICE, "/import"]],
  ["dispatcher", "phone", OFFICE],
  ["supervisor", "desktop", ["/horizon", "/record", "/settings/digests"]],
  ["supervisor", "phone", ["/settings/digests"]],
  ["administrator", "desktop", SETTINGS],
  ["administrator", "phone", SETTINGS],
  ["technician", "phone", ["/today", "/find", "/outbox"]],
];

let browser: Browser;
beforeAll(async () => {
  browser = await openBrowser();
});
afterAll(() => browser.close());

describe.each(PAGES)("%s at %s size", (role, size, paths) => {
  let watched: Awaited<ReturnType<typeof openPage>>;
  beforeAll(async () => {
    watched = await openPage(browser, size);
    await signIn(watched.page, role);
  });
  afterAll(() => watched.context.close());

  it.each(paths)("%s", async (path) => {
    const { page, errors, strayed } = watched;
    const response = await page.goto(productUrl(path), { waitUntil: "load" });
    expect(response?.status()).toBe(200);
    await page.waitForLoadState("networkidle");
    expect(await page.locator("h1").count(), "one first heading").toBe(1);
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    expect(errors).toEqual([]);
    expect(strayed).toEqual([]);
  });
});

describe("a visitor", () => {
  it.each(["/sign-in", "/forgotten"])("%s", async (path) => {
    const { page, errors, context } = await openPage(browser, "desktop");
    await page.goto(productUrl(path));
    await expectAccessible(page);
    expect(errors).toEqual([]);
    await context.close();
  });

  it("is sent to sign in from a page, and refused by the API", async () => {
    const { page, context } = await openPage(browser, "desktop");
    await page.goto(productUrl("/horizon?within=30"));
    expect(new URL(page.url()).pathname).toBe("/sign-in");
    const answer = await context.request.get(productUrl("/api/v1/assets"));
    expect(answer.status()).toBe(401);
    await context.close();
  });

  it("gets the headers that a browser is protected by", async () => {
    const { page, context } = await openPage(browser, "desktop");
    const response = await page.goto(productUrl("/sign-in"));
    const headers = response?.headers() ?? {};
    // OWASP HTTP Headers Cheat Sheet; script-src with a nonce instead of 'unsafe-inline'.
    const policy = headers["content-security-policy"] ?? "";
    expect(policy).toMatch(/script-src [^;]*'nonce-/);
    expect(policy).not.toMatch(/script-src [^;]*'unsafe-inline'/);
    expect(policy).toContain("frame-ancestors 'none'");
    expect(headers["x-content-type-options"]).toBe("nosniff");
    expect(headers["referrer-policy"]).toBeTruthy();
    expect(headers["x-powered-by"]).toBeUndefined();
    await context.close();
  });
});

describe("a page that a role may not see", () => {
  it("says so instead of showing it", async () => {
    const { page, context } = await openPage(browser, "desktop");
    await signIn(page, "technician");
    await page.goto(productUrl("/horizon"));
    expect(await page.getByRole("table").count()).toBe(0);
    await context.close();
  });
});
