"use client";

import { ActionForm } from "@/components/forms/action-form";
import { retryMailAction } from "../actions";

/** Orders a mail once more. */
export function RetryMail({ id, to }: { id: string; to: string }) {
  return (
    <ActionForm
      action={retryMailAction}
      submit="Try again"
      busy="Ordering…"
      kind="quiet"
      done={`The mail to ${to} is tried again.`}
    >
      <input type="hidden" name="id" value={id} />
    </ActionForm>
  );
}
