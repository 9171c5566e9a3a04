"use client";

import { ActionForm } from "@/components/forms/action-form";
import { FormDialog } from "@/components/forms/form-dialog";
import { TextArea } from "@/components/ui/inputs";
import { dismissFindingAction, reopenFindingAction } from "../actions";

/** Puts a finding aside, with why. */
export function DismissFinding({ id, called }: { id: string; called: string }) {
  return (
    <FormDialog
      kind="quiet"
      label="Dismiss…"
      name={`Dismiss ${called}`}
      title={`Dismiss: ${called}`}
      action={dismissFindingAction}
      submit="Dismiss"
      done="The finding is put aside; it stays in the list below."
    >
      {({ text }) => (
        <>
          <input type="hidden" name="id" value={id} />
          <p>Its marks go from the packs concerned. The reason is kept with your name.</p>
          <TextArea
            {...text("because")}
            label="Why nothing more is needed"
            hint="Checked and found otherwise, or dealt with."
            rows={3}
          />
        </>
      )}
    </FormDialog>
  );
}

/** Takes a dismissal back. */
export function ReopenFinding({ id }: { id: string }) {
  return (
    <ActionForm
      action={reopenFindingAction}
      submit="Open it again"
      kind="plain"
      done="The finding is open again."
    >
      <input type="hidden" name="id" value={id} />
    </ActionForm>
  );
}
