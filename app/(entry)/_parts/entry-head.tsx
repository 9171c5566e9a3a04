import type { ReactNode } from "react";

/** Title and lead of an entry page. */
export function EntryHead({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <div className="mb-4 border-t-2 border-ink pt-5">
      <h1 className="text-2xl">{title}</h1>
      {children && <div className="mt-1.5 text-soft">{children}</div>}
    </div>
  );
}
