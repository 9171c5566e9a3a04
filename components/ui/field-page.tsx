import type { ReactNode } from "react";

/**
 * The body of a phone page: one column that scrolls, and below it the acts within reach of a
 * thumb, which never lie over what is read.
 */
export function FieldPage({ children, foot }: { children: ReactNode; foot?: ReactNode }) {
  return (
    <main id="main" className="mx-auto flex h-[calc(100dvh-3rem)] max-w-lg flex-col">
      <div className="min-h-0 flex-1 overflow-y-auto overscroll-contain">
        <div className="flex flex-col gap-4 px-4 py-4">{children}</div>
      </div>
      {foot && (
        <div className="flex flex-col gap-2.5 border-t border-rule bg-paper px-4 py-3">{foot}</div>
      )}
    </main>
  );
}
