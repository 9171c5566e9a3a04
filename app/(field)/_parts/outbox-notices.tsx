import Link from "next/link";
import { Notice } from "@/components/ui/notice";
import type { FieldSnapshot } from "@/lib/offline/field-store";

const link = "textlink inline-flex min-h-12 items-center";

/** What the person should know about their entries: refused, waiting for a sign-in, another's. */
export function OutboxNotices({ field }: { field: FieldSnapshot }) {
  const { count, signedOut } = field;
  return (
    <>
      {signedOut && (
        <Notice
          kind="warn"
          action={
            <Link className={link} href="/sign-in?from=/today">
              Sign in
            </Link>
          }
        >
          Your sign-in has run out. {keptWords(count.toSend)} Nothing is lost.
        </Notice>
      )}
      {count.refused > 0 && (
        <Notice
          kind="warn"
          action={
            <Link className={link} href="/outbox">
              Look
            </Link>
          }
        >
          {count.refused === 1 ? "One entry was refused" : `${count.refused} entries were refused`}.
        </Notice>
      )}
      {count.others > 0 && (
        <Notice>
          {count.others === 1 ? "One entry" : `${count.others} entries`} of another person wait on
          this phone until they sign in.
        </Notice>
      )}
    </>
  );
}

function keptWords(toSend: number): string {
  if (toSend === 0) return "";
  return toSend === 1 ? "1 entry waits until you do." : `${toSend} entries wait until you do.`;
}
