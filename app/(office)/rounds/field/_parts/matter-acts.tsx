"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { TextArea, TextInput } from "@/components/ui/inputs";
import type { FieldMatter } from "@/lib/usecases/list-field-matters";
import { closeMatterAction, planAgainAction, sendAgainAction } from "../actions";

type Given = Pick<FieldMatter, "id" | "kind" | "returnOn">;

/** What can be decided about a matter. */
export function MatterActs({ matter, title }: { matter: Given; title: string }) {
  const { id, kind, returnOn } = matter;
  return (
    <div className="flex flex-wrap items-start gap-2">
      {(kind === "refused" || kind === "conflict") && (
        <FormDialog
          label="Send again"
          name={`Send again: ${title}`}
          title={`Send again: ${title}`}
          action={sendAgainAction}
          submit="Apply it now"
          done="Applied. The phone will hear of it."
        >
          {() => (
            <>
              <input type="hidden" name="id" value={id} />
              <p>
                The entry is applied as it was made, under its maker’s name and at the time it
                happened. First put right what stood in its way; otherwise it is refused again and
                nothing is changed.
              </p>
            </>
          )}
        </FormDialog>
      )}
      {kind === "cannot" && (
        <FormDialog
          label="Plan again"
          name={`Plan again: ${title}`}
          title={`Plan again: ${title}`}
          action={planAgainAction}
          submit="Leave it to the next plan"
          done="Left to the next plan."
        >
          {({ text }) => (
            <>
              <input type="hidden" name="id" value={id} />
              <TextInput {...text("returnOn", returnOn)} type="date" label="Not before" optional />
            </>
          )}
        </FormDialog>
      )}
      <FormDialog
        kind="quiet"
        label="Close"
        name={`Close: ${title}`}
        title={`Close: ${title}`}
        action={closeMatterAction}
        submit="Close it"
        done="Closed."
      >
        {({ text }) => (
          <>
            <input type="hidden" name="id" value={id} />
            <TextArea {...text("reason")} label="Why nothing more is done about it" rows={3} />
          </>
        )}
      </FormDialog>
    </div>
  );
}
