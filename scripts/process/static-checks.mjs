import { run } from "./command.mjs";

/** What dependency-cruiser looks at. */
const OURS = ["app", "components", "lib", "db", "migrations", "emails", "scripts", "tests"];
const MINUTES = 8;

/**
 * The checks that run nothing of the product.
 * @param {string} root
 * @returns {{ name: string, run: () => Promise<{ ok: boolean, output: string }> }[]}
 */
export function staticChecks(root) {
  /** @param {readonly (readonly string[])[]} commands */
  const inTurn = (commands) => async () => {
    for (const [file = "", ...args] of commands) {
      const command = [`node_modules/${file}`, ...args];
      const done = await run(process.execPath, command, { cwd: root, minutes: MINUTES });
      if (done.code !== 0) return { ok: false, output: done.output };
    }
    return { ok: true, output: "" };
  };
  const tsc = "typescript/bin/tsc";
  return [
    { name: "prettier", run: inTurn([["prettier/bin/prettier.cjs", "--check", "."]]) },
    { name: "eslint", run: inTurn([["eslint/bin/eslint.js", ".", "--max-warnings", "0"]]) },
    {
      name: "types",
      run: inTurn([
        ["next/dist/bin/next", "typegen"],
        [tsc, "--noEmit", "-p", "."],
        [tsc, "-p", "scripts/process/tsconfig.json"],
      ]),
    },
    {
      name: "imports",
      run: inTurn([
        ["dependency-cruiser/bin/dependency-cruise.mjs", ...OURS].concat([
          "--config",
          ".dependency-cruiser.cjs",
        ]),
      ]),
    },
  ];
}
