import type { Mail } from "../../scripts/mail-fake/mailbox";
import { mailUrl } from "./browser";

/** What the stand-in for the mail provider was given, oldest or newest first as it keeps them. */
export async function mails(): Promise<Mail[]> {
  return (await (await fetch(mailUrl("/_mails"))).json()) as Mail[];
}

/** What was given, once nothing more has come for four seconds: other stories' mails are over. */
export async function settledMails(): Promise<Mail[]> {
  let last = await mails();
  for (let quiet = 0; quiet < 4;) {
    await new Promise((resolve) => setTimeout(resolve, 1000));
    const now = await mails();
    quiet = now.length === last.length ? quiet + 1 : 0;
    last = now;
  }
  return last;
}

/** Reads until it holds, for a minute at most. @returns the last that was read */
export async function until<T>(read: () => Promise<T>, holds: (value: T) => boolean): Promise<T> {
  for (let waited = 0; ; waited += 500) {
    const value = await read();
    if (holds(value) || waited > 60_000) return value;
    await new Promise((resolve) => setTimeout(resolve, 500));
  }
}
