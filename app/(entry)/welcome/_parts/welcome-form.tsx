"use client";

import { ActionForm } from "@/components/forms/action-form";
import { TextInput } from "@/components/ui/inputs";
import { NewPassword } from "../../_parts/new-password";
import { acceptInvitationAction } from "../actions";

/** The invited person's name and first password. */
export function WelcomeForm(props: { token: string; name: string; email: string }) {
  return (
    <ActionForm action={acceptInvitationAction} submit="Set the password and start" tall>
      {(entries) => (
        <>
          <input type="hidden" name="token" value={props.token} />
          <input type="hidden" autoComplete="username" value={props.email} readOnly />
          <TextInput
            label="Your name"
            autoComplete="name"
            maxLength={120}
            {...entries.text("name", props.name)}
          />
          <NewPassword label="Password" error={entries.fault("password")} />
        </>
      )}
    </ActionForm>
  );
}
