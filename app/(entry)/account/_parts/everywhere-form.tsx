"use client";

import { ActionForm } from "@/components/forms/action-form";
import { signOutEverywhereAction } from "../actions";

/** Signs the person out on every device. */
export function EverywhereForm({ personId }: { personId: string }) {
  return (
    <ActionForm
      action={signOutEverywhereAction}
      submit="Sign out everywhere"
      busy="Signing out…"
      kind="danger"
      tall
    >
      <input type="hidden" name="personId" value={personId} />
    </ActionForm>
  );
}
