import { cpSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

const ROOT = fileURLToPath(new URL("../../", import.meta.url));
const CONFIGURATION = ["package.json", "tsconfig.json", "eslint.config.mjs"].concat([
  ".dependency-cruiser.cjs",
  "scripts/lint",
]);

export interface PlantedTree {
  readonly root: string;
  readonly remove: () => void;
}

/**
 * A small tree beside the real one, under the real rules, with files that break them.
 * @param files path → source
 */
export function plantTree(files: Readonly<Record<string, string>>): PlantedTree {
  const root = mkdtempSync(join(tmpdir(), "wanewright-planted-"));
  for (const path of CONFIGURATION) cpSync(join(ROOT, path), join(root, path), { recursive: true });
  symlinkSync(join(ROOT, "node_modules"), join(root, "node_modules"));
  for (const [path, source] of Object.entries(files)) {
    mkdirSync(dirname(join(root, path)), { recursive: true });
    writeFileSync(join(root, path), source);
  }
  return { root, remove: () => rmSync(root, { recursive: true, force: true }) };
}
