"use client";

import { type ReactNode, useState } from "react";
import { Button, type ButtonKind } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";

export interface EditDialogProps {
  /** The words on the button that opens it. */
  label: string;
  /** Read out instead of the label, where many buttons are alike: "Change North bank". */
  name?: string;
  title: string;
  kind?: ButtonKind;
  children: (close: () => void) => ReactNode;
}

/** A button that opens a form in a dialog; the form is made anew each time. */
export function EditDialog({ label, name, title, kind = "quiet", children }: EditDialogProps) {
  const [open, setOpen] = useState(false);
  const close = () => setOpen(false);
  return (
    <>
      <Button kind={kind} aria-label={name} onClick={() => setOpen(true)}>
        {label}
      </Button>
      <Dialog open={open} title={title} onClose={close}>
        {open && children(close)}
      </Dialog>
    </>
  );
}
