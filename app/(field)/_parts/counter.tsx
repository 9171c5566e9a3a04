"use client";

const button =
  "flex size-12 shrink-0 items-center justify-center rounded border-[1.5px] border-ink bg-sheet text-2xl font-semibold active:bg-hair disabled:border-rule disabled:text-soft";

/** A whole number that a gloved thumb sets: one down, one up. */
export function Counter(props: {
  /** What is counted, for the buttons' names: "LR20 in the van". */
  label: string;
  value: number;
  most?: number;
  onChange: (value: number) => void;
}) {
  const { label, value, most = 10_000, onChange } = props;
  return (
    <div role="group" aria-label={label} className="flex items-center gap-2">
      <button
        type="button"
        aria-label={`One less: ${label}`}
        className={button}
        disabled={value <= 0}
        onClick={() => onChange(value - 1)}
      >
        −
      </button>
      <output className="min-w-10 text-center text-xl font-semibold">{value}</output>
      <button
        type="button"
        aria-label={`One more: ${label}`}
        className={button}
        disabled={value >= most}
        onClick={() => onChange(value + 1)}
      >
        +
      </button>
    </div>
  );
}
