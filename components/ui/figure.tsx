import type { ReactNode } from "react";
import { toneText } from "@/components/charts/tone-class";
import type { Tone } from "@/lib/present/tone";

export interface FigureProps {
  label: string;
  /** The finished number with its unit, such as "31.5 h". */
  value: string;
  /** Its range or what it is of: "likely 19–28", "of 64 h". */
  range?: ReactNode;
  tone?: Tone;
}

/** One large serif figure with its label and its range. Use inside FigureRow. */
export function Figure({ label, value, range, tone = "order" }: FigureProps) {
  return (
    <div className="flex min-w-0 flex-col justify-between gap-0.5 border-rule py-1.5 pr-4 pb-3 border-l pl-4">
      <dt className="caps">{label}</dt>
      <dd className="flex flex-wrap items-baseline gap-x-2">
        <span className={`font-serif text-3xl font-medium tracking-tight ${toneText[tone]}`}>
          {value}
        </span>
        {range && <span className="text-soft">{range}</span>}
      </dd>
    </div>
  );
}

/** The row of figures under the masthead, closed by an ink rule. */
export function FigureRow({ children, actions }: { children: ReactNode; actions?: ReactNode }) {
  return (
    <div className="mb-3.5 flex flex-wrap items-end gap-x-6 border-b border-ink">
      {/* Pulled to the left and cut, so that no row of figures begins with a rule. */}
      <div className="min-w-0 flex-1 overflow-hidden">
        <dl className="-ml-[1.0625rem] grid grid-cols-[repeat(auto-fit,minmax(9rem,1fr))]">
          {children}
        </dl>
      </div>
      {actions && <div className="flex flex-wrap gap-2 pb-3">{actions}</div>}
    </div>
  );
}
