const MARKS: Readonly<Record<string, string>> = {
  "bad-lot": "weak lot",
  "draw-shift": "draw changed",
};

/** Says that an open finding concerns this pack; the asset's page says which. */
export function FindingMark({ kinds }: { kinds: readonly string[] | undefined }) {
  if (!kinds) return null;
  return (
    <span className="mr-1.5 border-l-4 border-honey pl-1.5 font-cond text-sm text-honey-ink">
      {kinds.map((kind) => MARKS[kind] ?? kind).join(", ")}
    </span>
  );
}
