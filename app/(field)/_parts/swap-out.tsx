import { Caution } from "@/components/ui/notice";
import type { DayAsset, DayPack, DayPackInService } from "@/lib/sync/day-pack";
import { Counter } from "./counter";
import { FieldChoice } from "./field-chip";
import { LOOK_WORDS, REASON_OUT_WORDS } from "./field-words";
import type { SwapDraft } from "./use-swap";
import { VoltsField } from "./volts-field";

const REASONS = Object.entries(REASON_OUT_WORDS) as [keyof typeof REASON_OUT_WORDS, string][];
const LOOKS = Object.entries(LOOK_WORDS) as [keyof typeof LOOK_WORDS, string][];

function cellCount(pack: { series: number; parallel: number }): string {
  const cells = pack.series * pack.parallel;
  return cells === 1 ? "1 cell" : `${cells} cells`;
}

/** What came out: its voltage, why, how it looks, and how many cells go into the return box. */
export function SwapOut(props: {
  day: DayPack;
  asset: DayAsset;
  pack: DayPackInService;
  draft: SwapDraft;
  set: (change: Partial<SwapDraft>) => void;
}) {
  const { day, asset, pack, draft, set } = props;
  return (
    <>
      <h2 className="text-xl">Out</h2>
      <VoltsField
        {...{ day, asset, kind: "resting" }}
        label="Voltage of the old pack, resting"
        value={draft.voltsOut}
        onChange={(voltsOut) => set({ voltsOut })}
      />
      <FieldChoice
        label="Why"
        options={REASONS}
        value={draft.reason}
        onChange={(reason) => set({ reason })}
      />
      <FieldChoice
        label={`The old pack looks (${cellCount(pack)})`}
        options={LOOKS}
        value={draft.look}
        onChange={(look) => set({ look })}
      />
      {draft.look !== "sound" && (
        <Caution title="Damaged cells">
          Gloves and eye protection on. Bag each cell alone, terminals taped.
        </Caution>
      )}
      <div className="flex flex-wrap items-center justify-between gap-2">
        <p>Old cells in the return box</p>
        <Counter
          label="Old cells in the return box"
          value={draft.cellsOut}
          most={pack.series * pack.parallel}
          onChange={(cellsOut) => set({ cellsOut })}
        />
      </div>
    </>
  );
}
