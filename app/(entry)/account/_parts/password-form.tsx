"use client";

import { ActionForm } from "@/components/forms/action-form";
import { TextInput } from "@/components/ui/inputs";
import { NewPassword } from "../../_parts/new-password";
import { changeOwnPasswordAction } from "../actions";

/** Present and new password. */
export function PasswordForm({ email }: { email: string }) {
  return (
    <ActionForm action={changeOwnPasswordAction} submit="Change the password" tall>
      {(entries) => (
        <>
          <input type="hidden" autoComplete="username" value={email} readOnly />
          <TextInput
            name="present"
            label="Present password"
            type="password"
            autoComplete="current-password"
            error={entries.fault("present")}
          />
          <NewPassword error={entries.fault("password")} />
        </>
      )}
    </ActionForm>
  );
}
