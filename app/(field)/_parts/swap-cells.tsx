import { FieldChoice } from "./field-chip";
import { Notice } from "@/components/ui/notice";
import { formatDay } from "@/lib/present/format-day";
import type { DayAsset, DayPack } from "@/lib/sync/day-pack";
import { firstLot, type SwapDraft } from "./use-swap";

/** Which cells went in, by lot from the van. */
export function SwapCells(props: {
  day: DayPack;
  asset: DayAsset;
  draft: SwapDraft;
  set: (change: Partial<SwapDraft>) => void;
}) {
  const { day, asset, draft, set } = props;
  const model = day.models.find((candidate) => candidate.id === asset.modelId);
  const count = (model?.series ?? 1) * (model?.parallel ?? 1);
  const types = day.cellTypes.filter((cell) => model?.cellTypeIds.includes(cell.id));
  const lots = (day.van?.lots ?? []).filter((lot) => lot.cellTypeId === draft.cellTypeId);
  const enough = lots.filter((lot) => lot.cells >= count);
  const lotOptions = [
    ...enough.map((lot) => [lot.lotId, lotWords(day, lot)] as const),
    ["", "Another lot"] as const,
  ];
  return (
    <div className="flex flex-col gap-3">
      <p>
        {count} × {types.find((cell) => cell.id === draft.cellTypeId)?.designation ?? "cells"}, all
        from one lot
      </p>
      {types.length > 1 && (
        <FieldChoice
          label="Cells"
          options={types.map((cell) => [cell.id, cell.designation] as const)}
          value={draft.cellTypeId}
          onChange={(cellTypeId) => set({ cellTypeId, lotId: firstLot(day, asset, cellTypeId) })}
        />
      )}
      <FieldChoice
        label="Lot"
        options={lotOptions}
        value={draft.lotId}
        onChange={(lotId) => set({ lotId })}
      />
      {enough.length === 0 && (
        <Notice kind="warn">
          No lot in the van has {count} of these by the count. If you have them all the same, keep
          the swap with “Another lot”; the count is put right in the stores.
        </Notice>
      )}
    </div>
  );
}

function lotWords(day: DayPack, lot: { code: string; madeOn: string | null; cells: number }) {
  const made = lot.madeOn ? `, made ${formatDay(lot.madeOn, day.organisation.locale)}` : "";
  return `${lot.code}${made} · ${lot.cells} left`;
}
