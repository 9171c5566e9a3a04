"use client";

import type { Entries } from "@/components/forms/action-form";
import { NumberInput, TextArea, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import { choices, REASON_WORDS } from "../../_parts/fleet-words";
import type { ActContext } from "./act-context";

/** What came out, and why. */
export function PackOutFields({ text }: Pick<Entries, "text">) {
  return (
    <>
      <div className="grid gap-4 sm:grid-cols-2">
        <Select
          {...text("reason", "due")}
          label="Why it came out"
          options={choices(REASON_WORDS)}
        />
        <NumberInput {...text("voltageOut")} label="Voltage out" unit="V" optional />
      </div>
      <TextInput
        {...text("stoppedAt")}
        label="Stopped at"
        hint="Only if the device was found stopped: when it was last heard, or found."
        type="datetime-local"
        optional
      />
      <TextArea {...text("look")} label="How the cells look" rows={2} optional />
    </>
  );
}

/** What goes in: cells of one type and one lot. */
export function PackInFields({ text, context }: Pick<Entries, "text"> & { context: ActContext }) {
  const { cellTypes, lots, places } = context.choices;
  const cells = context.series * context.parallel;
  return (
    <>
      <Select
        {...text("cellTypeId", cellTypes[0]?.id)}
        label={`Cells (${cells} of them)`}
        options={cellTypes.map((c) => ({ value: c.id, label: c.designation }))}
        placeholder={cellTypes.length === 0 ? "The device model lists no cells" : undefined}
      />
      <div className="grid gap-4 sm:grid-cols-2">
        <Select
          {...text("lotId")}
          label="Lot"
          optional
          placeholder="Not known"
          options={lots.map((lot) => ({
            value: lot.id,
            label: `${lot.code} · ${lot.designation} · ${lot.left} left`,
          }))}
        />
        <Select
          {...text("fromPlaceId")}
          label="Taken from"
          optional
          placeholder="Not counted"
          options={places.map((p) => ({ value: p.id, label: p.name }))}
        />
      </div>
      <TextInput
        {...text("madeOn")}
        label="Made on"
        hint="The date code; empty: the lot’s."
        type="date"
        optional
      />
    </>
  );
}
