"use client";

import { NumberInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import type { WhatIfProps } from "./what-if-props";

const KINDS = [
  { value: "resting", label: "resting" },
  { value: "loaded", label: "under load" },
];

type Props = Pick<WhatIfProps, "periodMinutes" | "states" | "otherCells"> & {
  fault: (name: string) => string | undefined;
};

/** A voltage read today, other work, other cells: any of the three. */
export function WhatIfFields({ periodMinutes, states, otherCells, fault }: Props) {
  // None is required, so none is marked as optional: the legends say that any will do.
  const field = (name: string) => {
    return { name, id: `what-if-${name}`, error: fault(name), required: false };
  };
  return (
    <div className="grid gap-x-8 gap-y-5 xl:grid-cols-[4fr_7fr_3fr]">
      <fieldset className="min-w-0">
        <legend className="caps mb-2">A voltage read today</legend>
        <div className="grid gap-4 sm:grid-cols-2">
          <NumberInput {...field("volts")} label="Voltage of the pack" unit="V" />
          <Select {...field("kind")} label="How" options={KINDS} defaultValue="resting" />
        </div>
      </fieldset>
      <fieldset className="min-w-0">
        <legend className="caps mb-2">The device working otherwise</legend>
        <div className="grid gap-4 sm:grid-cols-[2fr_3fr_2fr]">
          <NumberInput
            {...field("periodMinutes")}
            label={`Period, now ${periodMinutes} min`}
            unit="min"
          />
          <Select {...field("stateName")} label="Or the current of" options={states} />
          <NumberInput {...field("stateMilliamps")} label="would be" unit="mA" />
        </div>
      </fieldset>
      <fieldset className="min-w-0">
        <legend className="caps mb-2">Other cells</legend>
        {otherCells.length === 0 ? (
          <p className="text-soft">The device model lists no other cells.</p>
        ) : (
          <Select
            {...field("cellTypeId")}
            label="Had it run on"
            placeholder="the cells that are in"
            options={otherCells}
          />
        )}
      </fieldset>
    </div>
  );
}
