"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import { verdictAction } from "../actions";

const VERDICTS = [
  { value: "confirmed", label: "Confirm: it was read so" },
  { value: "set_aside", label: "Set aside: do not count it" },
  { value: "corrected", label: "Correct: another voltage was meant" },
];

/** Says what to make of one reading; the reading itself stays as logged. */
export function VerdictDialog({ readingId, called }: { readingId: string; called: string }) {
  return (
    <FormDialog
      kind="quiet"
      label="Judge"
      name={`Judge ${called}`}
      title={`What to make of ${called}`}
      action={verdictAction}
      submit="Save"
      done="The verdict stands beside the reading; the forecast is being renewed."
    >
      {({ text }, id) => (
        <>
          <input type="hidden" name="id" value={id} />
          <input type="hidden" name="readingId" value={readingId} />
          <Select {...text("verdict", "confirmed")} label="Verdict" options={VERDICTS} />
          <NumberInput
            {...text("correctedVolts")}
            label="Right voltage"
            hint="Only when you correct it."
            unit="V"
            optional
          />
          <TextInput {...text("note")} label="Why" optional />
        </>
      )}
    </FormDialog>
  );
}
