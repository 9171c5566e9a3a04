"use client";

import { useState } from "react";
import { fieldStore } from "@/lib/offline/browser-store";
import type { DayAsset, DayPack } from "@/lib/sync/day-pack";
import type { EntryBody } from "@/lib/sync/entries";
import { go } from "./go";
import type { SwapFormProps } from "./swap-form-props";
import { thousandths } from "./typed-number";
import { usePictures } from "./use-pictures";

type SwapBody = Extract<EntryBody, { kind: "swap" }>;

export interface SwapDraft {
  readonly voltsOut: string;
  readonly reason: SwapBody["reason"];
  readonly look: SwapBody["look"];
  /** Old cells that go into the return box. */
  readonly cellsOut: number;
  readonly cellTypeId: string;
  /** "" stands for cells whose lot is not in the van's list. */
  readonly lotId: string;
  readonly voltsIn: string;
  readonly note: string;
  readonly checks: readonly string[];
}

export const CHECKS = ["polarity", "same-lot", "taped"] as const;

/** The swap being entered; it is kept under the new pack's id however often it is pressed. */
export function useSwap({ day, asset, stopId, task, back, mended }: SwapFormProps) {
  const before = mended?.body.kind === "swap" ? mended.body : null;
  const [newPackId] = useState(() => before?.newPackId ?? crypto.randomUUID());
  const [draft, setDraft] = useState(() => firstDraft(day, asset, task?.cellTypeId, before));
  const [trouble, setTrouble] = useState<string | null>(null);
  const pictures = usePictures();
  const set = (change: Partial<SwapDraft>) => setDraft((known) => ({ ...known, ...change }));

  const keep = async () => {
    const fault = missing(draft, asset);
    if (fault) return setTrouble(fault);
    const body: SwapBody = {
      kind: "swap",
      assetId: asset.id,
      oldPackId: asset.pack && asset.pack.id !== newPackId ? asset.pack.id : null,
      newPackId,
      cellTypeId: draft.cellTypeId,
      lotId: draft.lotId || null,
      fromPlaceId: draft.lotId ? (day.van?.placeId ?? null) : null,
      reason: draft.reason,
      voltageOutMv: asset.pack ? thousandths(draft.voltsOut) : null,
      voltageInMv: thousandths(draft.voltsIn),
      look: draft.look,
      cellsOut: asset.pack ? draft.cellsOut : null,
      stoppedAt: null,
      stopId,
      note: draft.note.trim(),
    };
    const store = fieldStore();
    const said = await (mended ? store.mend(mended, body) : store.keepSeen(body, pictures.list));
    if (said) setTrouble(said);
    else go(back.href, true);
  };
  return { draft, set, trouble, keep, pictures };
}

function firstDraft(
  day: DayPack,
  asset: DayAsset,
  plannedCells: string | null | undefined,
  before: SwapBody | null,
): SwapDraft {
  const model = day.models.find((candidate) => candidate.id === asset.modelId);
  const cellTypeId =
    before?.cellTypeId ?? plannedCells ?? model?.cellTypeIds[0] ?? asset.pack?.cellTypeId ?? "";
  return {
    voltsOut: typed(before?.voltageOutMv),
    reason: before?.reason ?? (plannedCells ? "due" : "early"),
    look: before?.look ?? "sound",
    cellsOut: before?.cellsOut ?? (asset.pack ? asset.pack.series * asset.pack.parallel : 0),
    cellTypeId,
    lotId: before?.lotId ?? firstLot(day, asset, cellTypeId),
    voltsIn: typed(before?.voltageInMv),
    note: before?.note ?? "",
    checks: [],
  };
}

/** The oldest lot in the van that has a whole pack. */
export function firstLot(day: DayPack, asset: DayAsset, cellTypeId: string): string {
  const model = day.models.find((candidate) => candidate.id === asset.modelId);
  const cells = (model?.series ?? 1) * (model?.parallel ?? 1);
  const lot = day.van?.lots.find((l) => l.cellTypeId === cellTypeId && l.cells >= cells);
  return lot?.lotId ?? "";
}

function typed(millivolts: number | null | undefined): string {
  return millivolts === null || millivolts === undefined ? "" : String(millivolts / 1000);
}

function missing(draft: SwapDraft, asset: DayAsset): string | null {
  if (!draft.cellTypeId) return "Choose the cells that went in.";
  const wrong = [draft.voltsOut, draft.voltsIn].find(
    (volts) => volts !== "" && thousandths(volts) === null,
  );
  if (wrong !== undefined) return `“${wrong}” is no voltage: type it as 3.48.`;
  if (asset.pack && draft.voltsOut === "" && draft.reason !== "found_stopped") {
    return "Type the old pack’s voltage, or say that the device was found stopped.";
  }
  return CHECKS.every((check) => draft.checks.includes(check))
    ? null
    : "Tick the checks when they are done.";
}
