import type { CHECKS, SwapDraft } from "./use-swap";

const WORDS: readonly (readonly [(typeof CHECKS)[number], string])[] = [
  ["polarity", "Polarity checked against the marks"],
  ["same-lot", "All cells of one lot and date code"],
  ["taped", "Terminals of the old cells taped, cells in the return box"],
];

/** What is checked with the hands still on the device. */
export function SwapChecks(props: { draft: SwapDraft; set: (change: Partial<SwapDraft>) => void }) {
  const { checks } = props.draft;
  const press = (check: string, on: boolean) =>
    props.set({ checks: on ? [...checks, check] : checks.filter((known) => known !== check) });
  return (
    <fieldset className="flex flex-col">
      <legend className="caps pb-1">Checked</legend>
      {WORDS.map(([check, words]) => (
        <label key={check} className="flex min-h-12 items-center gap-3 border-t border-hair py-2">
          <input
            type="checkbox"
            className="size-7 shrink-0 accent-spruce"
            checked={checks.includes(check)}
            onChange={(event) => press(check, event.target.checked)}
          />
          {words}
        </label>
      ))}
    </fieldset>
  );
}
