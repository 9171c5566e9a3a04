import type { ReactNode } from "react";

export interface EmptyStateProps {
  /** What there is none of: "No pack reaches cut-off in these 90 days." */
  title: string;
  /** What to do next. */
  children?: ReactNode;
  action?: ReactNode;
}

/** Nothing here, and what to do about it. */
export function EmptyState({ title, children, action }: EmptyStateProps) {
  return (
    <div className="mx-auto flex max-w-md flex-col items-center gap-2 py-6 text-center whitespace-normal">
      <p className="font-serif text-lg font-medium text-balance">{title}</p>
      {children && <div className="text-soft">{children}</div>}
      {action && <div className="mt-2 flex gap-2">{action}</div>}
    </div>
  );
}

export interface ErrorPanelProps {
  /** What happened. */
  title: string;
  /** What was kept. */
  kept?: ReactNode;
  /** What to do now. */
  todo?: ReactNode;
  /** The reference to quote to an administrator. */
  reference?: string;
  action?: ReactNode;
}

/** Something went wrong: what happened, what was kept, what to do. */
export function ErrorPanel({ title, kept, todo, reference, action }: ErrorPanelProps) {
  return (
    <div role="alert" className="border border-rule border-l-4 border-l-brick bg-sheet px-4 py-3.5">
      <p className="font-serif text-lg font-medium">{title}</p>
      <dl className="mt-2 grid grid-cols-[auto_1fr] gap-x-3 gap-y-1">
        {kept && <Line term="Kept">{kept}</Line>}
        {todo && <Line term="Next">{todo}</Line>}
        {reference && (
          <Line term="Reference">
            <span className="font-mono text-xs">{reference}</span>
          </Line>
        )}
      </dl>
      {action && <div className="mt-3 flex flex-wrap gap-2">{action}</div>}
    </div>
  );
}

function Line({ term, children }: { term: string; children: ReactNode }) {
  return (
    <>
      <dt className="caps pt-0.5">{term}</dt>
      <dd>{children}</dd>
    </>
  );
}

export interface SkeletonProps {
  /** What is being fetched: "Loading the fleet". */
  label: string;
  rows?: number;
  /** The shape of what will stand here. */
  shape?: "table" | "figures" | "lines";
}

const bars = ["w-3/5", "w-4/5", "w-2/5", "w-3/4", "w-1/2"];

/** Ruled lines in the place of what is coming, so that nothing jumps. */
export function Skeleton({ label, rows = 6, shape = "table" }: SkeletonProps) {
  const tall = { table: "h-9.5", figures: "h-16", lines: "h-7" }[shape];
  return (
    <div
      role="status"
      className={shape === "table" ? "border border-rule bg-sheet" : "flex flex-col"}
    >
      <span className="sr-only">{label}…</span>
      {Array.from({ length: rows }, (_, i) => (
        <div
          key={i}
          aria-hidden="true"
          className={`flex animate-pulse items-center gap-6 border-t border-hair px-2.5 first:border-t-0 ${tall}`}
        >
          <span className="h-2.5 w-20 rounded bg-hair" />
          <span className="h-2.5 flex-1">
            <span className={`block h-2.5 rounded bg-hair ${bars[i % bars.length]}`} />
          </span>
          <span className="h-2.5 w-24 rounded bg-hair" />
        </div>
      ))}
    </div>
  );
}
