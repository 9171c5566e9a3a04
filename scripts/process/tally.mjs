import { tail } from "./command.mjs";

/**
 * @typedef {object} Outcome of a test run
 * @property {number} passed
 * @property {number} skipped
 * @property {{ name: string, why: string }[]} failures
 */

/** Counts what passed and what failed, and says so. */
export class Tally {
  #passed = 0;
  #skipped = 0;
  /** @type {string[]} */
  #failed = [];
  #print;

  /** @param {(line: string) => void} print */
  constructor(print) {
    this.#print = print;
  }

  /** @param {string} name of something that failed and is counted as one */
  fail(name) {
    this.#failed.push(name);
    this.#print(`  FAILED  ${name}`);
  }

  /**
   * Something that must be there first; it is not counted.
   * @template T
   * @param {string} name
   * @param {() => Promise<T>} work
   * @param {(result: T) => string} [tell]
   * @returns {Promise<T>}
   */
  async preparation(name, work, tell = String) {
    const watch = stopwatch();
    const result = await work();
    this.#line(name, tell(result), watch());
    return result;
  }

  /**
   * One check, counted as one.
   * @param {string} name
   * @param {() => Promise<{ ok: boolean, output: string }>} work
   * @returns {Promise<boolean>}
   */
  async check(name, work) {
    const watch = stopwatch();
    const { ok, output } = await work();
    this.#line(name, ok ? "passed" : "failed", watch());
    if (ok) this.#passed += 1;
    else {
      this.#print(tail(output, 60));
      this.fail(name);
    }
    return ok;
  }

  /**
   * A test run, counted test by test.
   * @param {string} name
   * @param {() => Promise<Outcome>} work
   */
  async tests(name, work) {
    const watch = stopwatch();
    const { passed, skipped, failures } = await work();
    const left = skipped ? `, ${skipped} skipped` : "";
    this.#line(name, `${passed} passed, ${failures.length} failed${left}`, watch());
    this.#passed += passed;
    this.#skipped += skipped;
    for (const failure of failures) {
      this.fail(`${name}: ${failure.name}`);
      this.#print(tail(failure.why.split("\n").slice(0, 30).join("\n"), 30));
    }
  }

  /** @returns {number} the exit code; the counts are the last line */
  finish() {
    if (this.#failed.length) this.#print("\nFailed:");
    for (const name of this.#failed) this.#print(`  ${name}`);
    if (this.#skipped) this.#print(`\n${this.#skipped} skipped`);
    this.#print(`\n${this.#passed} passed, ${this.#failed.length} failed`);
    return this.#failed.length === 0 && this.#passed > 0 ? 0 : 1;
  }

  /**
   * @param {string} name
   * @param {string} result
   * @param {string} seconds
   */
  #line(name, result, seconds) {
    this.#print(`  ${name.padEnd(14)} ${result} (${seconds} s)`);
  }
}

function stopwatch() {
  const began = performance.now();
  return () => ((performance.now() - began) / 1000).toFixed(1);
}
