import type { ReactNode } from "react";

/** The body of a phone page: one column, the acts within reach of a thumb. */
export function FieldPage({ children, foot }: { children: ReactNode; foot?: ReactNode }) {
  return (
    <main id="main" className="mx-auto flex min-h-[calc(100dvh-3rem)] max-w-lg flex-col">
      <div className="flex flex-1 flex-col gap-4 px-4 py-4">{children}</div>
      {foot && (
        <div className="sticky bottom-0 flex flex-col gap-2.5 border-t border-rule bg-paper px-4 py-3">
          {foot}
        </div>
      )}
    </main>
  );
}
