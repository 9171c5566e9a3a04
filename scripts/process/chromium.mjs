import { existsSync } from "node:fs";
import { installChromium } from "./packages.mjs";
import { Trouble } from "./trouble.mjs";

const PLACES = ["/usr/bin/chromium", "/usr/bin/chromium-browser", "/usr/bin/google-chrome"];

/**
 * The browser on this machine; CHROMIUM_PATH names another one.
 * @param {NodeJS.ProcessEnv} [env]
 * @returns {string | undefined}
 */
export function findChromium(env = process.env) {
  return [env.CHROMIUM_PATH, ...PLACES].find((path) => path && existsSync(path));
}

/** @returns {Promise<string>} */
export async function findOrInstallChromium() {
  const found = findChromium();
  if (found) return found;
  await installChromium();
  const installed = findChromium();
  if (installed) return installed;
  throw new Trouble("Chromium was installed but is not where it should be.", "Set CHROMIUM_PATH.");
}
