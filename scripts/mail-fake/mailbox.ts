import { mkdirSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";

export interface MailAttachment {
  readonly filename: string;
  readonly contentType: string;
  /** Base64. */
  readonly content: string;
}

export interface Mail {
  readonly id: string;
  /** When it was accepted, ISO 8601. */
  readonly at: string;
  readonly from: string;
  readonly to: readonly string[];
  readonly cc: readonly string[];
  readonly bcc: readonly string[];
  readonly replyTo: readonly string[];
  readonly subject: string;
  readonly html: string | null;
  readonly text: string | null;
  readonly headers: Readonly<Record<string, string>>;
  readonly attachments: readonly MailAttachment[];
  readonly idempotencyKey: string | null;
}

/** More than anybody looks through; the oldest go first. */
const KEPT = 2000;

/** The mails that arrived, newest first, kept as files when given a folder. */
export class Mailbox {
  private mails: Mail[] = [];
  private sequence = 0;

  constructor(private readonly folder: string | null) {
    if (folder === null) return;
    mkdirSync(folder, { recursive: true, mode: 0o700 });
    const names = readdirSync(folder).filter((name) => /^\d{8}\.json$/.test(name));
    for (const name of names.sort()) this.read(folder, name);
    this.sequence = Number(names.at(-1)?.slice(0, 8) ?? 0);
  }

  add(mail: Mail): void {
    this.sequence += 1;
    this.mails.unshift(mail);
    if (this.folder === null) {
      this.mails.length = Math.min(this.mails.length, KEPT);
      return;
    }
    const file = this.fileOf(this.folder, this.sequence);
    writeFileSync(`${file}.new`, JSON.stringify(mail), { mode: 0o600 });
    renameSync(`${file}.new`, file);
    if (this.mails.length > KEPT) {
      this.mails.length = KEPT;
      rmSync(this.fileOf(this.folder, this.sequence - KEPT), { force: true });
    }
  }

  all(): readonly Mail[] {
    return this.mails;
  }

  find(id: string): Mail | undefined {
    return this.mails.find((mail) => mail.id === id);
  }

  clear(): void {
    this.mails = [];
    if (this.folder === null) return;
    for (const name of readdirSync(this.folder)) {
      if (/^\d{8}\.json$/.test(name)) rmSync(join(this.folder, name), { force: true });
    }
  }

  private read(folder: string, name: string): void {
    try {
      this.mails.unshift(JSON.parse(readFileSync(join(folder, name), "utf8")) as Mail);
    } catch {
      rmSync(join(folder, name), { force: true }); // cut short by a crash
    }
  }

  private fileOf(folder: string, sequence: number): string {
    return join(folder, `${String(sequence).padStart(8, "0")}.json`);
  }
}
