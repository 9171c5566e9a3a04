import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { type BrowserContext, chromium, type Page } from "playwright-core";
import accounts from "../../scripts/seed/demo-accounts.json";
import { productUrl, withoutBackgroundSync } from "./browser";

/** A phone: a browser profile that outlives being switched off. */
export class Phone {
  private readonly profile = mkdtempSync(join(tmpdir(), "wanewright-phone-"));
  private on: { readonly context: BrowserContext; readonly page: Page } | null = null;

  /** @param args what the browser is told besides, a camera's picture for instance */
  constructor(private readonly args: readonly string[] = []) {}

  get page(): Page {
    if (!this.on) throw new Error("the phone is off");
    return this.on.page;
  }

  get context(): BrowserContext {
    return this.page.context();
  }

  async switchOn({ offline }: { offline: boolean }): Promise<void> {
    const context = await chromium.launchPersistentContext(this.profile, {
      executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
      viewport: { width: 360, height: 740 },
      hasTouch: true,
      locale: "en-GB",
      args: [
        ...["--headless", "--no-sandbox", "--disable-gpu", "--no-first-run"],
        ...["--disable-background-networking", "--disable-component-update", "--disable-sync"],
        ...this.args,
      ],
    });
    await context.setOffline(offline);
    const page = context.pages()[0] ?? (await context.newPage());
    await withoutBackgroundSync(page);
    this.on = { context, page };
  }

  /** As when the battery is pulled: nothing is asked first. */
  async switchOff(): Promise<void> {
    await this.on?.context.close();
    this.on = null;
  }

  /** Signs in and waits until the pages are on the phone. */
  async signIn(email: string): Promise<void> {
    const { page } = this;
    await page.goto(productUrl("/sign-in?from=/today"));
    await page.getByLabel("Mail address").fill(email);
    await page.getByLabel("Password", { exact: true }).fill(accounts[0]?.password ?? "");
    await page.getByRole("button", { name: "Sign in", exact: true }).click();
    await page.getByRole("list", { name: "Stops" }).waitFor({ timeout: 60_000 });
    const kept = () =>
      page.evaluate(async () => (await (await caches.open("wanewright-pages-2")).keys()).length);
    for (let tries = 0; (await kept()) < 7; tries++) {
      if (tries === 360) throw new Error("the pages did not get onto the phone within 90 s");
      await page.waitForTimeout(250);
    }
  }

  async throwAway(): Promise<void> {
    await this.switchOff();
    rmSync(this.profile, { recursive: true, force: true });
  }
}
