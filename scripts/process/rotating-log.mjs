import { createWriteStream, renameSync, statSync } from "node:fs";

const LARGEST_BYTES = 10 * 1024 * 1024;

/** A log file that cannot fill the disk: at 10 MiB it becomes `.1`, and a new one begins. */
export class RotatingLog {
  #path;
  #bytes;
  #stream;

  /** @param {string} path */
  constructor(path) {
    this.#path = path;
    this.#bytes = sizeOf(path);
    this.#stream = open(path);
  }

  /** @param {string} text */
  write(text) {
    if (this.#bytes > LARGEST_BYTES) {
      this.#stream.end();
      renameSync(this.#path, `${this.#path}.1`);
      this.#stream = open(this.#path);
      this.#bytes = 0;
    }
    this.#bytes += Buffer.byteLength(text);
    this.#stream.write(text);
  }

  close() {
    this.#stream.end();
  }
}

/** @param {string} path */
function open(path) {
  const stream = createWriteStream(path, { flags: "a" });
  stream.on("error", () => {}); // a full disk must not stop what is being logged
  return stream;
}

/** @param {string} path */
function sizeOf(path) {
  try {
    return statSync(path).size;
  } catch {
    return 0;
  }
}
