"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import { logVoltageAction } from "../actions";
import type { ActContext } from "./act-context";

const KINDS = [
  { value: "resting", label: "resting: the device drew almost nothing" },
  { value: "loaded", label: "under load: while it was sending" },
];

export interface LogDialogProps {
  context: ActContext;
  label?: string;
  /** What the form opens with. */
  opensWith?: { readonly volts: string; readonly kind: string };
}

/** Logs one voltage. */
export function LogDialog({ context, label = "Log a voltage", opensWith }: LogDialogProps) {
  return (
    <FormDialog
      kind="go"
      label={label}
      title={`Voltage of ${context.tag}`}
      action={logVoltageAction}
      submit="Log it"
      done={(r) =>
        r.doubt
          ? `Logged and marked as unlikely: ${r.doubt}.`
          : "Logged. The forecast is being renewed."
      }
    >
      {({ text }, id) => (
        <>
          <input type="hidden" name="id" value={id} />
          <input type="hidden" name="assetId" value={context.assetId} />
          <div className="grid gap-4 sm:grid-cols-2">
            <NumberInput
              {...text("volts", opensWith?.volts)}
              label="Voltage of the whole pack"
              unit="V"
              autoFocus
            />
            <TextInput {...text("at", context.now)} label="Read at" type="datetime-local" />
          </div>
          <Select {...text("kind", opensWith?.kind ?? "resting")} label="How" options={KINDS} />
          <div className="grid gap-4 sm:grid-cols-2">
            <NumberInput
              {...text("loadMilliamps")}
              label="Load current"
              hint="Under load; empty: the device’s own peak."
              unit="mA"
              optional
            />
            <NumberInput {...text("temperatureC")} label="Temperature" unit="°C" optional />
            <NumberInput {...text("accuracyMv")} label="Meter’s accuracy" unit="mV" optional />
            <TextInput {...text("instrument")} label="Meter" optional />
          </div>
          <TextInput {...text("note")} label="Note" optional />
        </>
      )}
    </FormDialog>
  );
}
