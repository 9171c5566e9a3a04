"use client";

import { ActionForm } from "@/components/forms/action-form";
import { Button } from "@/components/ui/button";
import { EditDialog } from "../../_parts/edit-dialog";
import { revokeApiKeyAction } from "../actions";

/** Asks once, then ends the key. */
export function RevokeKey({ id, name }: { id: string; name: string }) {
  return (
    <EditDialog label="Revoke…" name={`Revoke the key for ${name}`} title={`Revoke ${name}?`}>
      {(close) => (
        <ActionForm
          action={revokeApiKeyAction}
          submit="Revoke"
          busy="Revoking…"
          kind="danger"
          done={`The key for ${name} is revoked.`}
          onDone={close}
          aside={<Button onClick={close}>Keep</Button>}
        >
          <input type="hidden" name="id" value={id} />
          <p>
            The program that uses it is refused from its next request on. This cannot be undone.
          </p>
        </ActionForm>
      )}
    </EditDialog>
  );
}
