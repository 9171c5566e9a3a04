"use client";

import { ActionForm } from "@/components/forms/action-form";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { EditDialog } from "../../_parts/edit-dialog";
import { saveClimateAction } from "../actions";

export interface ClimateDialogProps {
  id: string;
  months: readonly string[];
  stored?: { name: string; monthlyMeanDc: readonly number[] };
}

/** Adds a climate or changes its twelve monthly means. */
export function ClimateDialog({ id, months, stored }: ClimateDialogProps) {
  const opener = stored
    ? { label: "Change", name: `Change ${stored.name}`, title: stored.name }
    : { label: "Add a climate…", title: "Add a climate", kind: "go" as const };
  const mean = (month: number) => {
    const tenths = stored?.monthlyMeanDc[month];
    return tenths === undefined ? "" : (tenths / 10).toFixed(1);
  };
  return (
    <EditDialog {...opener}>
      {(close) => (
        <ActionForm action={saveClimateAction} submit="Save" done="Saved." onDone={close}>
          {(entries) => (
            <>
              <input type="hidden" name="id" value={id} />
              <TextInput label="Name" {...entries.text("name", stored?.name)} />
              <div className="grid grid-cols-2 gap-x-6 gap-y-2 sm:grid-cols-3">
                {months.map((month, i) => (
                  <NumberInput
                    key={month}
                    label={month}
                    unit="°C"
                    {...entries.text(`monthlyMeanC.${i}`, mean(i))}
                  />
                ))}
              </div>
            </>
          )}
        </ActionForm>
      )}
    </EditDialog>
  );
}
