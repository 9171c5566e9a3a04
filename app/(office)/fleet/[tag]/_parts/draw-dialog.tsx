"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import type { ButtonKind } from "@/components/ui/button";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { measureDrawAction } from "../actions";
import type { ActContext } from "./act-context";

export interface DrawDialogProps {
  context: ActContext;
  label?: string;
  kind?: ButtonKind;
}

/** Records a measured draw. */
export function DrawDialog(props: DrawDialogProps) {
  const { context, label = "Measured draw", kind = "quiet" } = props;
  return (
    <FormDialog
      kind={kind}
      label={label}
      title={`Measured draw of ${context.tag}`}
      action={measureDrawAction}
      submit="Save"
      done="From now on the measured draw stands in for the model’s duty cycle."
    >
      {({ text }, id) => (
        <>
          <input type="hidden" name="id" value={id} />
          <input type="hidden" name="assetId" value={context.assetId} />
          <div className="grid gap-4 sm:grid-cols-2">
            <NumberInput
              {...text("averageMicroamps")}
              label="Average of the pack"
              hint="Over whole periods of the duty cycle."
              unit="µA"
            />
            <NumberInput {...text("peakMilliamps")} label="Peak" unit="mA" optional />
          </div>
          <TextInput {...text("at", context.now)} label="Measured at" type="datetime-local" />
          <TextInput {...text("method")} label="How" hint="Meter, shunt, how long." optional />
        </>
      )}
    </FormDialog>
  );
}
