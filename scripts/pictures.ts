/**
 * `npm run pictures`: takes the README's pictures from the product that `npm start` runs on
 * the scenario, as its demonstration people see it.
 */
import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { type Browser, chromium } from "playwright-core";
import { findOrInstallChromium } from "./process/chromium.mjs";
import { homeOf, ROOT } from "./process/place.mjs";
import { runningStart } from "./process/run-record.mjs";
import accounts from "./seed/demo-accounts.json";

const FOLDER = join(ROOT, "docs/pictures");

const PICTURES = [
  { role: "dispatcher", path: "/horizon", file: "horizon.png", width: 1440, height: 900 },
  { role: "technician", path: "/today", file: "today.png", width: 390, height: 844 },
] as const;
type Picture = (typeof PICTURES)[number];

async function main(): Promise<void> {
  const address = process.env.APP_URL ?? runningStart(homeOf())?.address;
  if (!address) throw new Error("Run `npm start` in another window first.");
  mkdirSync(FOLDER, { recursive: true });
  const browser = await chromium.launch({
    executablePath: await findOrInstallChromium(),
    args: ["--headless", "--no-sandbox", "--disable-gpu", "--disable-background-networking"],
  });
  try {
    for (const picture of PICTURES) await take(browser, address, picture);
  } finally {
    await browser.close();
  }
}

async function take(browser: Browser, address: string, picture: Picture): Promise<void> {
  const { role, path, file, width, height } = picture;
  const account = accounts.find((entry) => entry.role === role);
  const page = await browser.newPage({ viewport: { width, height }, colorScheme: "light" });
  await page.goto(`${address}/sign-in`);
  await page.getByLabel("Mail address").fill(account?.email ?? "");
  await page.getByLabel("Password", { exact: true }).fill(account?.password ?? "");
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.waitForURL((url) => !url.pathname.startsWith("/sign-in"));
  await page.goto(`${address}${path}`, { waitUntil: "networkidle" });
  await page.screenshot({ path: join(FOLDER, file) });
  console.log(`docs/pictures/${file}`);
  await page.close();
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
