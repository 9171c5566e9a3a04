"use client";

import { ActionForm, type FormAction } from "@/components/forms/action-form";
import { Button } from "@/components/ui/button";
import { EditDialog } from "./edit-dialog";

export interface ConfirmRemovalProps<Result> {
  id: string;
  /** What will be gone: "North bank". */
  called: string;
  /** What is lost with it. */
  loses: string;
  action: FormAction<Result>;
}

/** Asks once, naming what will be lost. */
export function ConfirmRemoval<Result>(props: ConfirmRemovalProps<Result>) {
  const { id, called, loses, action } = props;
  return (
    <EditDialog label="Remove" name={`Remove ${called}`} title={`Remove ${called}?`}>
      {(close) => (
        <ActionForm
          action={action}
          submit="Remove"
          busy="Removing…"
          kind="danger"
          done={`${called} is removed.`}
          onDone={close}
          aside={<Button onClick={close}>Keep</Button>}
        >
          <input type="hidden" name="id" value={id} />
          <p>{loses}</p>
        </ActionForm>
      )}
    </EditDialog>
  );
}
