import { interruptCommands } from "./command.mjs";

/** Thrown between steps once somebody asked for an end. */
export class Interrupted extends Error {}

/**
 * The life of one run: what was started is stopped in reverse order, once, whether the run
 * ends by itself, by a signal or by a failure.
 */
export class Lifetime {
  /** @type {{ name: string, stop: () => unknown }[]} */
  #started = [];
  /** @type {(code: number) => void} */
  #settle = () => {};
  /** Fulfilled with the exit code when somebody asks for the end. @type {Promise<number>} */
  asked = new Promise((resolve) => (this.#settle = resolve));
  /** @type {string | undefined} */
  reason;
  #ending = false;

  /**
   * Hears Ctrl-C, a polite kill and a closed terminal. A kill of npm ends the shell between
   * npm and this process and never reaches it: then the parent changes.
   */
  listen() {
    for (const signal of /** @type {const} */ (["SIGINT", "SIGTERM", "SIGHUP"])) {
      process.on(signal, () => this.ask(signal, 0));
    }
    const parent = process.ppid;
    const look = () => process.ppid === parent || this.ask("npm was ended", 0);
    if (process.env.npm_lifecycle_event) setInterval(look, 500).unref();
    return this;
  }

  /** Whether anything would have to be stopped. */
  get hasStarted() {
    return this.#started.length > 0;
  }

  /**
   * Asks for the end.
   * @param {string} reason
   * @param {number} code the exit code it leads to
   */
  ask(reason, code) {
    if (this.reason !== undefined) return;
    this.reason = reason;
    if (!this.#ending) interruptCommands();
    this.#settle(code);
  }

  /** @throws Interrupted when the end was asked for */
  check() {
    if (this.reason !== undefined) throw new Interrupted(this.reason);
  }

  /**
   * @param {string} name
   * @param {() => unknown} stop
   */
  onEnd(name, stop) {
    this.#started.push({ name, stop });
  }

  /**
   * Stops everything, the last started first. A failure to stop one does not spare the others.
   * @param {(name: string, error: unknown) => void} onFailure
   */
  async end(onFailure) {
    this.#ending = true;
    for (const { name, stop } of this.#started.splice(0).reverse()) {
      try {
        await stop();
      } catch (error) {
        onFailure(name, error);
      }
    }
  }
}
