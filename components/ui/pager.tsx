import Link from "next/link";
import { pagesToOffer } from "@/lib/present/paging";

export interface PagerProps {
  /** 1-based. */
  page: number;
  pageCount: number;
  /** For example "101–200 of 1,284 assets". */
  summary: string;
  hrefFor: (page: number) => string;
}

const step = "inline-flex min-h-8 min-w-8 items-center justify-center rounded px-2";

/** Steps through a long list; every page is an address. */
export function Pager({ page, pageCount, summary, hrefFor }: PagerProps) {
  const steps = { page, pageCount, hrefFor };
  return (
    <nav aria-label="Pages" className="mt-2 flex flex-wrap items-center gap-x-4 gap-y-1 no-print">
      <span className="text-soft">{summary}</span>
      {pageCount > 1 && (
        <ul className="ml-auto flex items-center gap-1">
          <Step {...steps} target={page - 1} label="Previous" />
          {pagesToOffer(page, pageCount).map((target, i) =>
            target === null ? (
              <li key={`gap-${i}`} className="px-1 text-soft">
                …
              </li>
            ) : (
              <Step key={target} {...steps} target={target} label={String(target)} />
            ),
          )}
          <Step {...steps} target={page + 1} label="Next" />
        </ul>
      )}
    </nav>
  );
}

type StepProps = Omit<PagerProps, "summary"> & { target: number; label: string };

function Step({ page, pageCount, hrefFor, target, label }: StepProps) {
  if (target === page) {
    return (
      <li aria-current="page" className={`${step} border border-ink font-medium`}>
        {label}
      </li>
    );
  }
  if (target < 1 || target > pageCount) return <li className={`${step} text-soft`}>{label}</li>;
  return (
    <li>
      <Link
        href={hrefFor(target)}
        prefetch={false}
        className={`${step} text-dusk-ink hover:bg-sheet`}
      >
        {label}
      </Link>
    </li>
  );
}
