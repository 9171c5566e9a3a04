import { readFileSync, rmSync } from "node:fs";
import { join, relative } from "node:path";
import { run, tail } from "./command.mjs";

const MINUTES = 15;

/**
 * One project of vitest.config.ts.
 * @param {string} root
 * @param {string} project
 * @param {readonly string[]} rest files and filters
 * @param {NodeJS.ProcessEnv} env
 * @param {string} logs
 * @returns {Promise<import("./tally.mjs").Outcome>}
 */
export async function runVitest(root, project, rest, env, logs) {
  const report = join(logs, `${project}.json`);
  rmSync(report, { force: true });
  const reporters = ["--reporter=default", "--reporter=json", `--outputFile.json=${report}`];
  const args = ["node_modules/vitest/vitest.mjs", "run", "--project", project, ...reporters];
  const done = await run(process.execPath, [...args, ...rest], {
    cwd: root,
    env: { ...process.env, NODE_ENV: "test", ...env },
    log: join(logs, `${project}.log`),
    minutes: MINUTES,
  });
  const outcome = readReport(report, root);
  if (outcome === undefined) {
    return { passed: 0, skipped: 0, failures: [{ name: "vitest ended early", why: done.output }] };
  }
  // A leaked error after the last test fails the run without failing any test.
  if (done.code !== 0 && outcome.failures.length === 0) {
    outcome.failures.push({ name: "vitest reports an error", why: tail(done.output, 30) });
  }
  if (outcome.passed === 0 && outcome.failures.length === 0) {
    outcome.failures.push({ name: "no test ran", why: tail(done.output, 10) });
  }
  return outcome;
}

/**
 * Reads what vitest's JSON reporter wrote. A file that could not be loaded counts as one failure.
 * @param {string} report
 * @param {string} root
 * @returns {import("./tally.mjs").Outcome | undefined}
 */
export function readReport(report, root) {
  let json;
  try {
    json = JSON.parse(readFileSync(report, "utf8"));
  } catch {
    return undefined;
  }
  /** @type {import("./tally.mjs").Outcome} */
  const outcome = { passed: 0, skipped: 0, failures: [] };
  for (const file of json.testResults) {
    const path = relative(root, file.name);
    let failedHere = 0;
    for (const { status, fullName, failureMessages } of file.assertionResults) {
      if (status === "passed") outcome.passed += 1;
      else if (status === "failed") {
        failedHere += 1;
        const why = failureMessages.join("\n");
        outcome.failures.push({ name: `${path} > ${fullName}`, why });
      } else outcome.skipped += 1;
    }
    if (file.status === "failed" && failedHere === 0) {
      outcome.failures.push({ name: path, why: file.message ?? "" });
    }
  }
  return outcome;
}
