"use client";

import { ActionForm } from "@/components/forms/action-form";
import { EditDialog } from "../../_parts/edit-dialog";
import { invitePersonAction } from "../actions";
import { PersonEntries } from "./person-entries";

/** The dialog that makes an account and mails the invitation. */
export function InvitePerson() {
  return (
    <EditDialog label="Invite a person…" title="Invite a person" kind="go">
      {(close) => (
        <ActionForm
          action={invitePersonAction}
          submit="Send the invitation"
          busy="Sending…"
          done={({ email }) => `An invitation is on its way to ${email}.`}
          onDone={close}
        >
          {(entries) => <PersonEntries entries={entries} />}
        </ActionForm>
      )}
    </EditDialog>
  );
}
