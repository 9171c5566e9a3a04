import { FieldLink } from "./field-link";

export interface FieldBarProps {
  /** "Wed 9 Dec", "Stop 3 of 8". */
  title: string;
  /** The title is the page's h1; leave out where the page has a heading of its own. */
  heading?: boolean;
  back?: { href: string; label: string };
  /** Signal and outbox in words: "no signal · 3 entries kept". Announced when it changes. */
  status?: string;
  /** A plain fact at the right instead: "09:52", "QF-0981". */
  aside?: string;
}

/** The dark bar at the top of each phone page. */
export function FieldBar({ title, heading, back, status, aside }: FieldBarProps) {
  return (
    <header className="sticky top-0 z-10 flex min-h-12 items-center gap-2.5 bg-bar px-4 text-on-bar">
      {back && (
        <FieldLink
          href={back.href}
          aria-label={back.label}
          className="-ml-3 flex size-12 items-center justify-center text-2xl"
        >
          <span aria-hidden="true">‹</span>
        </FieldLink>
      )}
      {heading ? (
        <h1 className="font-sans text-md font-semibold tracking-normal">{title}</h1>
      ) : (
        <span className="font-semibold">{title}</span>
      )}
      {status !== undefined && (
        <span role="status" className="ml-auto py-1 text-right">
          {status}
        </span>
      )}
      {aside && <span className={status === undefined ? "ml-auto" : ""}>{aside}</span>}
    </header>
  );
}
