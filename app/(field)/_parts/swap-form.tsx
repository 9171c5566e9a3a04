"use client";

import { BigButton } from "@/components/ui/big-button";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { Caution, Notice } from "@/components/ui/notice";
import { TextArea } from "@/components/ui/inputs";
import { chemistryCaution } from "./field-words";
import { PhotoField } from "./photo-field";
import { SwapCells } from "./swap-cells";
import { SwapOut } from "./swap-out";
import { SwapChecks } from "./swap-checks";
import type { SwapFormProps } from "./swap-form-props";
import { useSwap } from "./use-swap";
import { VoltsField } from "./volts-field";

/** Voltage out, cells out, cells in, checks, voltage in: in the order of the hands. */
export function SwapForm(props: SwapFormProps) {
  const { day, asset, back } = props;
  const swap = useSwap(props);
  const { draft, set } = swap;
  const old = day.cellTypes.find((cell) => cell.id === asset.pack?.cellTypeId);
  const fresh = day.cellTypes.find((cell) => cell.id === draft.cellTypeId);
  const cautions = [chemistryCaution(old?.spec.chemistry), chemistryCaution(fresh?.spec.chemistry)];
  const shown = [...new Set(cautions)].flatMap((caution) => caution ?? []);
  return (
    <>
      <FieldBar
        title={asset.pack ? "Swap the pack" : "Put a pack in"}
        heading
        back={back}
        aside={asset.tag}
      />
      <FieldPage
        foot={
          <>
            {swap.trouble && <Notice kind="trouble">{swap.trouble}</Notice>}
            <BigButton kind="go" disabled={swap.pictures.busy} onClick={() => void swap.keep()}>
              {asset.pack ? "Keep this swap" : "Keep this pack"}
            </BigButton>
          </>
        }
      >
        <p className="font-semibold">{asset.name}</p>
        {shown.map((caution) => (
          <Caution key={caution.title} title={caution.title}>
            {caution.text}
          </Caution>
        ))}
        {asset.pack && <SwapOut {...{ day, asset, pack: asset.pack, draft, set }} />}
        <h2 className="text-xl">In</h2>
        <SwapCells {...{ day, asset, draft, set }} />
        <SwapChecks {...{ draft, set }} />
        <VoltsField
          {...{ day, asset, kind: "loaded" }}
          label="Voltage of the new pack, device running"
          value={draft.voltsIn}
          onChange={(voltsIn) => set({ voltsIn })}
        />
        {!props.mended && <PhotoField pictures={swap.pictures} />}
        <TextArea
          {...{ name: "note", label: "Note", optional: true, rows: 2, maxLength: 800 }}
          value={draft.note}
          onChange={(event) => set({ note: event.target.value })}
        />
      </FieldPage>
    </>
  );
}
