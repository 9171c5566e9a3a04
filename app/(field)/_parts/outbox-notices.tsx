import { FieldLink } from "@/components/ui/field-link";
import { Notice } from "@/components/ui/notice";
import type { FieldSnapshot } from "@/lib/offline/field-store";

/** Below this nobody would notice. */
const SKEW_TOLD_MS = 5 * 60_000;

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
            <FieldLink className={link} href="/sign-in?from=/today">
              Sign in
            </FieldLink>
          }
        >
          Your sign-in has run out. {keptWords(count.toSend)} Nothing is lost.
        </Notice>
      )}
      {field.told && <Notice kind="warn">{field.told}</Notice>}
      {field.outdated && (
        <Notice
          kind="warn"
          action={
            <button type="button" className={link} onClick={() => window.location.reload()}>
              Load it
            </button>
          }
        >
          A newer version is on this phone. What you kept is safe.
        </Notice>
      )}
      {Math.abs(field.skewMs) > SKEW_TOLD_MS && (
        <Notice kind="warn">
          This phone’s clock is {skewWords(field.skewMs)}. Times are put right when they are sent.
        </Notice>
      )}
      {count.refused > 0 && (
        <Notice
          kind="warn"
          action={
            <FieldLink className={link} href="/outbox">
              Look
            </FieldLink>
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

/** "23 h ahead", "12 min behind". */
function skewWords(skewMs: number): string {
  const minutes = Math.round(Math.abs(skewMs) / 60_000);
  const much = minutes < 120 ? `${minutes} min` : `${Math.round(minutes / 60)} h`;
  return `${much} ${skewMs > 0 ? "ahead" : "behind"}`;
}
