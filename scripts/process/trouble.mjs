/**
 * A failure that the person at the keyboard can mend: what is wrong, and what to do.
 * Printed as two lines, never with a stack trace. Anything else that is thrown is a defect.
 */
export class Trouble extends Error {
  /**
   * @param {string} what
   * @param {string} mend
   */
  constructor(what, mend) {
    super(what);
    this.name = "Trouble";
    this.mend = mend;
  }
}

/**
 * Turns an error of the operating system into words; other errors come back as they are.
 * @param {unknown} error
 * @param {string} doing what was being done, as "writing the log"
 * @returns {unknown}
 */
export function inWords(error, doing) {
  if (!(error instanceof Error) || error instanceof Trouble) return error;
  const { code, path } = /** @type {NodeJS.ErrnoException} */ (error);
  const where = path ? ` (${path})` : "";
  switch (code) {
    case "ENOSPC":
    case "EDQUOT":
      return new Trouble(
        `The disk is full while ${doing}${where}.`,
        "Free some space (`df -h` shows where), then run the command again; nothing is lost.",
      );
    case "EACCES":
    case "EPERM":
      return new Trouble(
        `A right is missing while ${doing}${where}.`,
        "Make that place writable for this user, or set WANEWRIGHT_DATA to a folder that is.",
      );
    case "EROFS":
      return new Trouble(
        `The file system is read-only while ${doing}${where}.`,
        "Set WANEWRIGHT_DATA to a folder on a writable file system.",
      );
    case "ENOTDIR":
    case "EISDIR":
      return new Trouble(
        `Something of the wrong kind is in the way while ${doing}${where}.`,
        "Move the file or folder named above out of the way, then run the command again.",
      );
    default:
      return error;
  }
}

/**
 * Prints what went wrong for a person. Defects keep their stack, troubles have none.
 * @param {unknown} error
 * @param {string} doing
 * @param {(line: string) => void} [print]
 */
export function printTrouble(error, doing, print = console.error) {
  const told = inWords(error, doing);
  if (told instanceof Trouble) {
    print(`\nCould not go on: ${told.message}`);
    print(`What to do:      ${told.mend}`);
    return;
  }
  print(`\nA defect while ${doing}. Please report it with these lines:`);
  print(told instanceof Error ? (told.stack ?? told.message) : String(told));
}
