/**
 * The phone pages in Chromium: how much script the first load of Today takes, and how long it is from
 * the icon to the list of stops without network, at a processor slowed down four times.
 *
 *   BENCH_URL=http://localhost:3000 npm run bench:field -- [--json]
 */
import { mkdtempSync, rmSync } from "node:fs";
import { loadavg, tmpdir } from "node:os";
import { join } from "node:path";
import { brotliCompressSync } from "node:zlib";
import { type BrowserContext, chromium, type Page } from "playwright-core";
import { fieldScenario } from "../../tests/support/field-scenario";
import accounts from "../seed/demo-accounts.json";

const URL_ = process.env.BENCH_URL ?? "http://localhost:3000";
const SLOWER = 4;
const RUNS = 7;
const profile = mkdtempSync(join(tmpdir(), "wanewright-bench-"));

/** Notes the moment the first stop stands in the page, by the page's own clock. */
const MARK_LIST = `
  const look = () => {
    if (document.querySelector('ol[aria-label="Stops"] a')) window.listAt = performance.now();
    else requestAnimationFrame(look);
  };
  look();`;

async function phone(): Promise<{ context: BrowserContext; page: Page }> {
  const context = await chromium.launchPersistentContext(profile, {
    executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
    viewport: { width: 360, height: 740 },
    args: ["--headless", "--no-sandbox", "--disable-gpu", "--no-first-run"],
  });
  await context.addInitScript(MARK_LIST);
  return { context, page: context.pages()[0] ?? (await context.newPage()) };
}

async function signIn(page: Page, email: string): Promise<void> {
  await page.goto(`${URL_}/sign-in?from=/today`);
  await page.getByLabel("Mail address").fill(email);
  await page.getByLabel("Password", { exact: true }).fill(accounts[0]?.password ?? "");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.getByRole("list", { name: "Stops" }).waitFor({ timeout: 120_000 });
  await page.waitForFunction(
    async () => (await (await caches.open("wanewright-pages-2")).keys()).length === 7,
    undefined,
    { timeout: 120_000 },
  );
}

/** The scripts the page names and a browser of today runs, as Brotli (level 11) makes them. */
async function firstLoad(page: Page): Promise<{ path: string; bytes: number }[]> {
  const html = await page.evaluate(async () => (await fetch("/today")).text());
  const tags = (html.match(/<script\b[^>]*>/g) ?? []).filter((tag) => !/nomodule/i.test(tag));
  const paths = tags.flatMap((tag) => /\bsrc="(\/_next\/[^"]+)"/.exec(tag)?.[1] ?? []);
  return Promise.all(
    [...new Set(paths)].map(async (path) => {
      const script = await (await fetch(URL_ + path)).text();
      return { path, bytes: brotliCompressSync(script).length };
    }),
  );
}

/** Opens Today from a cold browser without network; milliseconds until the list stands there. */
async function iconToList(): Promise<number> {
  const { context, page } = await phone();
  await context.setOffline(true);
  const tools = await context.newCDPSession(page);
  await tools.send("Emulation.setCPUThrottlingRate", { rate: SLOWER });
  await page.goto(`${URL_}/today`, { waitUntil: "commit" });
  await page.waitForFunction(() => (window as { listAt?: number }).listAt, undefined, {
    timeout: 120_000,
  });
  const at = await page.evaluate(() => (window as { listAt?: number }).listAt ?? 0);
  await context.close();
  return at;
}

const scenario = await fieldScenario(process.env.DATABASE_URL ?? "", 12);
try {
  const { context, page } = await phone();
  await signIn(page, scenario.email);
  const scripts = await firstLoad(page);
  await context.close();
  const times: number[] = [];
  for (let run = 0; run < RUNS; run++) times.push(await iconToList());
  times.sort((a, b) => a - b);
  const result = {
    scriptKb: scripts.reduce((sum, script) => sum + script.bytes, 0) / 1000,
    scripts,
    iconToListMs: { least: times[0], median: times[RUNS >> 1], most: times.at(-1) },
    slower: SLOWER,
    load: loadavg()[0],
  };
  if (process.argv.includes("--json")) console.log(JSON.stringify(result));
  else {
    for (const { path, bytes } of scripts) console.log(`  ${String(bytes).padStart(7)}  ${path}`);
    console.log(`First load of Today: ${result.scriptKb.toFixed(1)} kB of script (Brotli)`);
    const { least, median, most } = result.iconToListMs;
    const ms = (value: number | undefined) => Math.round(value ?? 0);
    console.log(
      `Icon to list without network, ${SLOWER}× slower: median ${ms(median)} ms of ${RUNS} (${ms(least)} to ${ms(most)}), load ${result.load?.toFixed(1)}`,
    );
  }
} finally {
  await scenario.db.destroy();
  rmSync(profile, { recursive: true, force: true });
}
