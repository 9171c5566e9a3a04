import Link from "next/link";
import { EntryHead } from "./entry-head";

/** A link from a mail that no longer works, and where to get another. */
export function DeadLink({ again }: { again: { href: string; label: string } | null }) {
  return (
    <>
      <EntryHead title="This link no longer works">
        Links work once and for a short time. This one was used already, has expired, or a newer one
        was sent.
      </EntryHead>
      <p className="flex flex-wrap gap-x-5">
        {again ? (
          <Link className="textlink inline-flex min-h-11 items-center" href={again.href}>
            {again.label}
          </Link>
        ) : (
          <span>Ask your administrator to invite you again.</span>
        )}
        <Link className="textlink inline-flex min-h-11 items-center" href="/sign-in">
          Sign in
        </Link>
      </p>
    </>
  );
}
