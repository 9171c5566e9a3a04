"use client";

import { type ReactNode, useState } from "react";
import { ActionForm, type Entries, type FormAction } from "@/components/forms/action-form";
import { Button, type ButtonKind } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";

export interface FormDialogProps<Result> {
  /** The words on the button that opens it. */
  label: string;
  /** Read out instead of the label, where many buttons are alike. */
  name?: string;
  title: string;
  kind?: ButtonKind;
  action: FormAction<Result>;
  submit: string;
  submitKind?: ButtonKind;
  done?: string | ((result: Result) => string);
  /** The same id as long as the dialog is open: sending twice does one thing. */
  children: (entries: Entries, id: string) => ReactNode;
}

/** A button that opens one form in a dialog and closes it when the form is done. */
export function FormDialog<Result>(props: FormDialogProps<Result>) {
  const { label, name, title, kind, action, submit, submitKind, done, children } = props;
  const [id, setId] = useState<string | null>(null);
  return (
    <>
      <Button kind={kind} aria-label={name} onClick={() => setId(crypto.randomUUID())}>
        {label}
      </Button>
      <Dialog open={id !== null} title={title} onClose={() => setId(null)}>
        {id !== null && (
          <ActionForm
            action={action}
            submit={submit}
            kind={submitKind}
            done={done}
            onDone={() => setId(null)}
          >
            {(entries) => children(entries, id)}
          </ActionForm>
        )}
      </Dialog>
    </>
  );
}
