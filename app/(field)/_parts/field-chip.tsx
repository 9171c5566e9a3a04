import { FieldLink } from "@/components/ui/field-link";
import type { ReactNode } from "react";

const look = (on: boolean) =>
  `inline-flex min-h-12 items-center rounded-full border-[1.5px] px-4 ${
    on ? "border-ink bg-sheet font-semibold text-ink" : "border-soft bg-sheet text-soft"
  }`;

/** One of a few choices, for a thumb. */
export function FieldChoice<Value extends string>(props: {
  label: string;
  /** The label is only read out. */
  quiet?: boolean;
  options: readonly (readonly [Value, string])[];
  value: Value | null;
  onChange: (value: Value) => void;
}) {
  return (
    <fieldset className="flex flex-col gap-1.5">
      <legend className={props.quiet ? "sr-only" : "caps pb-1.5"}>{props.label}</legend>
      <div className="flex flex-wrap gap-2">
        {props.options.map(([value, word]) => (
          <button
            key={value}
            type="button"
            aria-pressed={props.value === value}
            onClick={() => props.onChange(value)}
            className={look(props.value === value)}
          >
            {word}
          </button>
        ))}
      </div>
    </fieldset>
  );
}

/** A choice that is another page. */
export function ChipPage({
  href,
  on,
  children,
}: {
  href: string;
  on: boolean;
  children: ReactNode;
}) {
  return (
    <FieldLink href={href} aria-current={on ? "page" : undefined} className={look(on)}>
      {children}
    </FieldLink>
  );
}
