import { AxeBuilder } from "@axe-core/playwright";
import { type Browser, type BrowserContext, chromium, type Page } from "playwright-core";
import { expect } from "vitest";
import accounts from "../../scripts/seed/demo-accounts.json";

export const SIZES = {
  desktop: { width: 1440, height: 900 },
  phone: { width: 390, height: 844 },
} as const;
export type Size = keyof typeof SIZES;
export type DemoRole = "administrator" | "dispatcher" | "supervisor" | "technician";

/** Addresses of the running product; the test runner starts it and says where it is. */
export function productUrl(path = ""): string {
  return `${required("E2E_URL")}${path}`;
}

export function mailUrl(path = ""): string {
  return `${required("E2E_MAIL_URL")}${path}`;
}

function required(name: string): string {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set: run \`npm test -- e2e\`.`);
  return value;
}

export async function openBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
    args: [
      "--headless",
      "--no-sandbox",
      "--disable-gpu",
      "--disable-quic",
      "--no-first-run",
      "--disable-background-networking",
      "--disable-component-update",
      "--disable-sync",
    ],
  });
}

/** A page whose every request and every console error is watched. */
export interface WatchedPage {
  readonly page: Page;
  readonly context: BrowserContext;
  /** Console errors and uncaught exceptions so far. */
  readonly errors: string[];
  /** Requests that tried to leave this machine; they are cut off. */
  readonly strayed: string[];
}

export async function openPage(browser: Browser, size: Size): Promise<WatchedPage> {
  const context = await browser.newContext({
    viewport: SIZES[size],
    hasTouch: size === "phone",
    locale: "en-GB",
    reducedMotion: "reduce",
  });
  const page = await context.newPage();
  const errors: string[] = [];
  const strayed: string[] = [];
  page.on("console", (message) => {
    if (message.type() === "error") errors.push(`${page.url()}: ${message.text()}`);
  });
  page.on("pageerror", (error) => errors.push(`${page.url()}: ${error.message}`));
  await context.route("**/*", (route) => {
    const { hostname, protocol } = new URL(route.request().url());
    if (protocol.startsWith("http") && !["localhost", "127.0.0.1", "[::1]"].includes(hostname)) {
      strayed.push(route.request().url());
      return route.abort();
    }
    return route.fallback();
  });
  return { page, context, errors, strayed };
}

/** Signs a demonstration account in, as a person would. */
export async function signIn(page: Page, role: DemoRole): Promise<void> {
  const account = accounts.find((entry) => entry.role === role);
  if (!account) throw new Error(`no demonstration account for ${role}`);
  await page.goto(productUrl("/sign-in"));
  await page.getByLabel("Mail address").fill(account.email);
  await page.getByLabel("Password", { exact: true }).fill(account.password);
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.waitForURL((url) => !url.pathname.startsWith("/sign-in"));
}

/**
 * Marks on a map stand where the places are, also close together. Criterion 2.5.8 lets a target be
 * small where the same can be done by another one on the page: the list beside the map does it.
 */
const isOnMap = (node: { html: string } | undefined) =>
  /class="[^"]*leaflet-marker/.test(node?.html ?? "");

/** WCAG 2.2 AA by axe; the rules' sources are the W3C's success criteria. */
export async function expectAccessible(page: Page): Promise<void> {
  const { violations } = await new AxeBuilder({ page })
    .withTags(["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"])
    .analyze();
  const told = violations.flatMap(({ id, help, nodes }) => {
    const places = nodes.map((node) => node.target.join(" "));
    const held = id === "target-size" ? places.filter((_, n) => !isOnMap(nodes[n])) : places;
    return held.length > 0 ? [`${id}: ${help} (${held.slice(0, 3).join("; ")})`] : [];
  });
  expect(told, `accessibility of ${page.url()}`).toEqual([]);
}

/** The page as a whole never scrolls sideways (WCAG 2.2, 1.4.10 Reflow). */
export async function expectNoSidewaysScroll(page: Page): Promise<void> {
  const [needed, there] = await page.evaluate(() => [
    document.documentElement.scrollWidth,
    window.innerWidth,
  ]);
  expect(needed, `width of ${page.url()}`).toBeLessThanOrEqual(there ?? 0);
}

/**
 * Takes Background Sync away from a page. `setOffline` cuts pages off, but not the service worker that
 * the browser wakes: it would send at once what a test means to keep.
 */
export async function withoutBackgroundSync(page: Page): Promise<void> {
  await page.addInitScript(
    'Object.defineProperty(ServiceWorkerRegistration.prototype, "sync", { value: undefined })',
  );
}
