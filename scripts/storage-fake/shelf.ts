import { randomUUID } from "node:crypto";
import { mkdir, readFile, rename, rm, writeFile } from "node:fs/promises";
import { dirname, join, resolve, sep } from "node:path";

export interface Stored {
  readonly contentType: string;
  readonly bytes: Buffer;
}

/** Objects as files of one folder; a crash leaves either the old object or the new one. */
export class Shelf {
  private readonly root: string;

  constructor(folder: string) {
    this.root = resolve(folder);
  }

  async put(key: string, { contentType, bytes }: Stored): Promise<void> {
    const file = this.fileOf(key);
    await mkdir(dirname(file), { recursive: true });
    const unfinished = `${file}.${randomUUID()}`;
    const head = Buffer.from(`${JSON.stringify({ contentType })}\n`);
    await writeFile(unfinished, Buffer.concat([head, bytes]));
    await rename(unfinished, file);
  }

  async get(key: string): Promise<Stored | null> {
    try {
      const whole = await readFile(this.fileOf(key));
      const end = whole.indexOf("\n");
      const { contentType } = JSON.parse(whole.subarray(0, end).toString()) as Stored;
      return { contentType, bytes: whole.subarray(end + 1) };
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code === "ENOENT") return null;
      throw error;
    }
  }

  async remove(key: string): Promise<void> {
    await rm(this.fileOf(key), { force: true });
  }

  /** @throws RangeError when a key would lead out of the folder */
  private fileOf(key: string): string {
    const file = resolve(join(this.root, `${key}.object`));
    if (!file.startsWith(this.root + sep)) throw new RangeError("This key leads elsewhere.");
    return file;
  }
}
