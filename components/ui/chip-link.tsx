import Link from "next/link";
import type { ReactNode } from "react";

export interface ChipLinkProps {
  /** The list's address with this filter set, or taken off when it is on. */
  href: string;
  active?: boolean;
  /** How many rows the filter leaves. */
  count?: number | string;
  children: ReactNode;
}

/** A filter whose state lives in the address: press to set, press again to take off. */
export function ChipLink({ href, active = false, count, children }: ChipLinkProps) {
  return (
    <Link
      href={href}
      prefetch={false}
      scroll={false}
      aria-current={active ? "true" : undefined}
      className={`inline-flex min-h-7 items-center gap-1.5 rounded-full border px-3 text-sm no-print hover:border-ink ${
        active ? "border-ink bg-sheet font-medium text-ink" : "border-rule bg-sheet text-soft"
      }`}
    >
      {children}
      {count !== undefined && <span className="font-cond text-soft">{count}</span>}
      {active && (
        <span aria-hidden="true" className="text-soft">
          ×
        </span>
      )}
    </Link>
  );
}

/** The line above a list: chips at the left, what is shown and the acts at the right. */
export function FilterBar(props: {
  children: ReactNode;
  summary?: ReactNode;
  actions?: ReactNode;
}) {
  return (
    <div className="mb-2.5 flex flex-wrap items-center gap-x-2.5 gap-y-2">
      {props.children}
      <div className="ml-auto flex flex-wrap items-center gap-x-3 gap-y-2">
        {props.summary && <span className="text-soft">{props.summary}</span>}
        {props.actions}
      </div>
    </div>
  );
}
