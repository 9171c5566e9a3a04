"use client";

import { ActionForm } from "@/components/forms/action-form";
import { NewPassword } from "../../../_parts/new-password";
import { choosePasswordAction } from "../../actions";

/** One field; the hidden address lets a password manager file the new password. */
export function ChoosePasswordForm({ token, email }: { token: string; email: string }) {
  return (
    <ActionForm action={choosePasswordAction} submit="Set the password and sign in" tall>
      {(entries) => (
        <>
          <input type="hidden" name="token" value={token} />
          <input type="hidden" autoComplete="username" value={email} readOnly />
          <NewPassword error={entries.fault("password")} />
        </>
      )}
    </ActionForm>
  );
}
