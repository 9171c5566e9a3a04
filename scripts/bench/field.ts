/**
 * The phone pages in Chromium: how much script the first load of Today takes, and how long it is from
 * the icon to the list of stops without network, at a processor slowed down four times.
 *
 * The browser reaches the product through a proxy that is gone for the second part: pages, service
 * worker and browser are refused every connection, and nobody has told them that they are offline.
 * The slow-down holds for the page only: Chromium refuses it for workers ("only supported for
 * pages"). On a busy machine the time says as much about that as about the product: mind the load.
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
import { severableNetwork } from "./severable-network";

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

async function phone(proxy: string): Promise<{ context: BrowserContext; page: Page }> {
  const context = await chromium.launchPersistentContext(profile, {
    executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
    viewport: { width: 360, height: 740 },
    args: [
      ...["--headless", "--no-sandbox", "--disable-gpu", "--no-first-run"],
      ...["--disable-background-networking", "--disable-component-update", "--disable-sync"],
      ...[`--proxy-server=${proxy}`, "--proxy-bypass-list=<-loopback>"],
    ],
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

/**
 * Opens Today from a cold browser without network.
 * @returns milliseconds from the start of the navigation, as the page's own clock has them
 */
async function iconToList(proxy: string, start: string): Promise<number> {
  const { context, page } = await phone(proxy);
  try {
    const tools = await context.newCDPSession(page);
    await tools.send("Emulation.setCPUThrottlingRate", { rate: SLOWER });
    await page.goto(`${URL_}${start}`, { waitUntil: "commit" });
    await page.waitForFunction(() => (window as { listAt?: number }).listAt, undefined, {
      timeout: 60_000,
    });
    return await page.evaluate(() => (window as { listAt?: number }).listAt ?? 0);
  } finally {
    await context.close();
  }
}

/** The address behind the icon, as the manifest has it. */
async function startAddress(): Promise<string> {
  const manifest = (await (await fetch(`${URL_}/manifest.webmanifest`)).json()) as {
    readonly start_url: string;
  };
  return manifest.start_url;
}

interface Result {
  readonly scriptKb: number;
  readonly scripts: readonly { readonly path: string; readonly bytes: number }[];
  readonly iconToListMs: { readonly least: number; readonly median: number; readonly most: number };
  readonly runs: number;
  readonly slower: number;
  readonly load: number | undefined;
}

async function measure(email: string): Promise<Result> {
  const network = await severableNetwork();
  const { context, page } = await phone(network.address);
  await signIn(page, email);
  const scripts = await firstLoad(page);
  const start = await startAddress();
  await context.close();
  await network.cut();
  const times: number[] = [];
  for (let run = 0; run < RUNS; run++) times.push(await iconToList(network.address, start));
  times.sort((a, b) => a - b);
  const at = (place: number) => Math.round(times[place] ?? 0);
  return {
    scriptKb: scripts.reduce((sum, script) => sum + script.bytes, 0) / 1000,
    scripts,
    iconToListMs: { least: at(0), median: at(RUNS >> 1), most: at(RUNS - 1) },
    runs: RUNS,
    slower: SLOWER,
    load: loadavg()[0],
  };
}

function print({ scripts, scriptKb, iconToListMs, runs, load }: Result): void {
  for (const { path, bytes } of scripts) console.log(`  ${String(bytes).padStart(7)}  ${path}`);
  console.log(`First load of Today: ${scriptKb.toFixed(1)} kB of script (Brotli)`);
  const { least, median, most } = iconToListMs;
  console.log(
    `Icon to list, every connection refused, ${SLOWER}× slower: median ${median} ms of ${runs} (${least} to ${most}), load ${load?.toFixed(1)}`,
  );
}

const scenario = await fieldScenario(process.env.DATABASE_URL ?? "", 12);
try {
  const result = await measure(scenario.email);
  if (process.argv.includes("--json")) console.log(JSON.stringify(result));
  else print(result);
} finally {
  await scenario.db.destroy();
  // A browser that has just been closed may still be writing.
  rmSync(profile, { recursive: true, force: true, maxRetries: 20, retryDelay: 250 });
}
