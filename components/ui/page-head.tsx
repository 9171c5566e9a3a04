import Link from "next/link";
import type { ReactNode } from "react";

export interface PageHeadProps {
  title: string;
  /** Where this page hangs from: "Fleet" for an asset. */
  crumb?: { label: string; href: string };
  /** One line on what the page is about, or the facts beneath the title. */
  lede?: ReactNode;
  /** A tag or a mark before the title, in mono. */
  tag?: string;
  actions?: ReactNode;
}

/** The title of a page with its acts. One to a page: it holds the h1. */
export function PageHead({ title, crumb, lede, tag, actions }: PageHeadProps) {
  return (
    <div className="mb-4 flex flex-wrap items-end gap-x-6 gap-y-3 border-b border-ink pb-3">
      <div className="min-w-0 flex-1 basis-96">
        {(crumb || tag) && (
          <div className="mb-0.5 flex items-center gap-2">
            {crumb && (
              <Link href={crumb.href} className="textlink">
                {crumb.label}
              </Link>
            )}
            {crumb && tag && <span className="text-soft">/</span>}
            {tag && <span className="font-mono text-xs font-semibold">{tag}</span>}
          </div>
        )}
        <h1 className="text-2xl">{title}</h1>
        {lede && <div className="mt-1 max-w-prose text-soft">{lede}</div>}
      </div>
      {actions && <div className="flex flex-wrap items-center gap-2">{actions}</div>}
    </div>
  );
}

/** A ruled part of a page with its small heading. */
export function Section(props: { title: string; aside?: ReactNode; children: ReactNode }) {
  return (
    <section className="mb-5 border border-rule bg-sheet">
      <div className="flex min-h-9.5 flex-wrap items-center justify-between gap-x-4 border-b border-ink px-3 py-1.5">
        <h2 className="caps">{props.title}</h2>
        {props.aside && <div className="text-sm text-soft">{props.aside}</div>}
      </div>
      {props.children}
    </section>
  );
}
