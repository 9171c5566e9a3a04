import type { ReactNode } from "react";

export type NoticeKind = "info" | "done" | "warn" | "trouble";

const kinds: Record<NoticeKind, { edge: string; word: string; wordClass: string }> = {
  info: { edge: "border-l-dusk", word: "Note", wordClass: "text-dusk-ink" },
  done: { edge: "border-l-spruce", word: "Done", wordClass: "text-spruce-ink" },
  warn: { edge: "border-l-honey", word: "Mind", wordClass: "text-honey-ink" },
  trouble: { edge: "border-l-brick", word: "Trouble", wordClass: "text-brick-ink" },
};

export interface NoticeProps {
  kind?: NoticeKind;
  /** The word before the text; each kind has one, so that it is not told by colour alone. */
  word?: string;
  children: ReactNode;
  action?: ReactNode;
}

/** A line about the page or about what was just done. */
export function Notice({ kind = "info", word, children, action }: NoticeProps) {
  const look = kinds[kind];
  return (
    <div
      role={kind === "trouble" ? "alert" : "status"}
      className={`mb-3 flex flex-wrap items-center gap-x-4 gap-y-2 border border-rule border-l-4 bg-sheet px-3 py-2 ${look.edge}`}
    >
      <div className="min-w-0 flex-1 basis-64">
        <strong className={`font-semibold ${look.wordClass}`}>{word ?? look.word}.</strong>{" "}
        {children}
      </div>
      {action}
    </div>
  );
}

export interface CautionProps {
  /** What can hurt: "Lithium cell". */
  title: string;
  /** What to do, short. */
  children: ReactNode;
  /** Whom it yields to. Never left out. */
  defer?: string;
}

/** A short caution at the point of action; always yields to those who know the place. */
export function Caution({
  title,
  children,
  defer = "Your site rules, the maker's data and licensed practice come first.",
}: CautionProps) {
  return (
    <div
      role="note"
      aria-label={`Caution: ${title}`}
      className="border-l-[5px] border-honey bg-honey-tint px-3 py-2.5 text-ink"
    >
      <strong className="font-semibold">{title}.</strong> {children} {defer}
    </div>
  );
}
