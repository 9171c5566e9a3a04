/** Prints one line for each step: what, how it went, how long it took. */
export class Steps {
  #print;
  /** @type {() => void} */
  #check;

  /**
   * @param {(text: string) => void} print
   * @param {() => void} check throws when the run should go no further
   */
  constructor(print, check) {
    this.#print = print;
    this.#check = check;
  }

  /**
   * @template T
   * @param {string} name
   * @param {(say: (line: string) => void) => Promise<T>} work `say` prints a line under way
   * @param {(result: T) => string} tell
   * @returns {Promise<T>}
   */
  async step(name, work, tell) {
    this.#check();
    const began = performance.now();
    const result = await work((line) => this.#print(`  ${name.padEnd(12)} ${line} …`));
    this.#check();
    const seconds = ((performance.now() - began) / 1000).toFixed(1);
    this.#print(`  ${name.padEnd(12)} ${tell(result)} (${seconds} s)`);
    return result;
  }
}
