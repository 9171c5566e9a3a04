/**
 * A phone whose clock is a day ahead: it still shows today's round, says so, and what is measured is
 * recorded when it was measured by our clock. The truth is this machine's clock, which the
 * browser's pages do not see.
 */
import { afterAll, beforeAll, expect, it } from "vitest";
import { productUrl } from "../support/browser";
import { type FieldScenario, fieldScenario } from "../support/field-scenario";
import { Phone } from "../support/phone-browser";

const DAY_MS = 86_400_000;
const MINUTE_MS = 60_000;
/** Only what the pages take for the time of day; how time passes stays the browser's. */
const WRONG_CLOCK = `{
  const Right = Date;
  globalThis.Date = class extends Right {
    constructor(...given) {
      if (given.length > 0) super(...given);
      else super(Right.now() + ${DAY_MS});
    }
    static now = () => Right.now() + ${DAY_MS};
  };
}`;
const phone = new Phone();
const startedAt = new Date();
let scenario: FieldScenario;

beforeAll(async () => {
  scenario = await fieldScenario(process.env.DATABASE_URL ?? "", 2);
  await phone.switchOn({ offline: false });
  await phone.context.addInitScript(WRONG_CLOCK);
  await phone.signIn(scenario.email);
}, 240_000);

afterAll(async () => {
  await phone.throwAway();
  await scenario?.db.destroy();
});

it("shows today's round, says how far the clock is off, and dates what is logged rightly", async () => {
  const { page } = phone;
  const stop = scenario.stops[0];
  await page.goto(productUrl("/today"));
  await page.getByText("This phone’s clock is 24 h ahead").waitFor();
  await page.getByText("Today’s round").waitFor();
  await page.getByRole("list", { name: "Stops" }).getByRole("link").first().click();
  await page.getByRole("link", { name: "Log a voltage only" }).click();
  const millivolts = (stop?.plausibleMv ?? 0) - 2;
  for (const sign of (millivolts / 1000).toFixed(3)) {
    const name = sign === "." ? "Decimal sign" : sign;
    await page.getByRole("button", { name, exact: true }).click();
  }
  await page.getByRole("button", { name: "Keep this reading" }).click();
  const logged = () =>
    scenario.db
      .selectFrom("reading")
      .select(["at", "millivolts"])
      .where("packId", "=", stop?.packId ?? "")
      .where("receivedAt", ">=", startedAt)
      .execute();
  await expect.poll(async () => (await logged()).length, { timeout: 30_000 }).toBe(1);
  const [row] = await logged();
  expect(row?.millivolts).toBe(millivolts);
  expect(Math.abs((row?.at.getTime() ?? 0) - Date.now())).toBeLessThan(2 * MINUTE_MS);
}, 120_000);
