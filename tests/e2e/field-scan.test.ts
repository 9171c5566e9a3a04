/**
 * Find by scanning, in Chromium with a fake camera that plays a picture of a plate. This Chromium has
 * no detector of its own, so the decoder that the phone carries reads it, with the network cut.
 */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, expect, it } from "vitest";
import { expectAccessible, expectNoSidewaysScroll, productUrl } from "../support/browser";
import { writeCameraPicture } from "../support/camera-picture";
import { type FieldScenario, fieldScenario } from "../support/field-scenario";
import { Phone } from "../support/phone-browser";

const folder = mkdtempSync(join(tmpdir(), "wanewright-camera-"));
const picture = join(folder, "plate.y4m");
const phone = new Phone([
  ...["--use-fake-device-for-media-stream", "--use-fake-ui-for-media-stream"],
  `--use-file-for-fake-video-capture=${picture}`,
]);
let scenario: FieldScenario;

beforeAll(async () => {
  scenario = await fieldScenario(process.env.DATABASE_URL ?? "", 3);
  await writeCameraPicture(picture, { kind: "qrcode", text: "nothing yet" });
  await phone.switchOn({ offline: false });
  await phone.signIn(scenario.email);
  await phone.switchOff();
}, 240_000);

afterAll(async () => {
  await phone.throwAway();
  await scenario?.db.destroy();
  rmSync(folder, { recursive: true, force: true });
});

it.each([
  ["qrcode", 1],
  ["code128", 2],
] as const)(
  "a %s on a plate finds its asset without signal",
  async (kind, n) => {
    const { tag = "", assetId = "" } = scenario.stops[n] ?? {};
    await writeCameraPicture(picture, { kind, text: tag });
    await phone.switchOn({ offline: true });
    const { page } = phone;
    await page.goto(productUrl("/find"));
    expect(await page.evaluate(() => "BarcodeDetector" in globalThis)).toBe(false);
    await page.getByRole("button", { name: "Scan the code" }).click();
    await page.getByLabel("Camera picture").waitFor();
    const found = page.getByRole("list", { name: "Assets" }).getByRole("link");
    await expect.poll(() => found.count(), { timeout: 30_000 }).toBe(1);
    expect(await page.getByLabel("Tag, name or site").inputValue()).toBe(tag);
    await found.click();
    await page.waitForURL((url) => url.searchParams.get("asset") === assetId);
    await expectAccessible(page);
    await expectNoSidewaysScroll(page);
    await phone.switchOff();
  },
  120_000,
);
