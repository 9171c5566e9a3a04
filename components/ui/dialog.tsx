"use client";

import { useEffect, useId, useRef, type ReactNode } from "react";

export interface DialogProps {
  open: boolean;
  title: string;
  /** Called when the dialog is closed by Escape, the cross, or the browser. */
  onClose: () => void;
  children: ReactNode;
  /** The acts at the foot; the main one last. */
  actions?: ReactNode;
}

/** A native modal dialog: the browser traps the focus and gives it back. */
export function Dialog({ open, title, onClose, children, actions }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (!dialog) return;
    if (open && !dialog.open) dialog.showModal();
    if (!open && dialog.open) dialog.close();
  }, [open]);
  return (
    <dialog
      ref={ref}
      aria-labelledby={titleId}
      onClose={onClose}
      className="m-auto text-left whitespace-normal w-[min(36rem,calc(100vw-2rem))] rounded border border-ink bg-sheet p-0 text-ink"
    >
      <div className="flex items-start justify-between gap-4 border-b border-ink px-4 py-3">
        <h2 id={titleId} className="text-lg">
          {title}
        </h2>
        <button
          type="button"
          aria-label="Close"
          onClick={onClose}
          className="-mr-1.5 -mt-0.5 size-8 shrink-0 rounded text-xl leading-none hover:bg-hair"
        >
          ×
        </button>
      </div>
      <div className="px-4 py-4">{children}</div>
      {actions && (
        <div className="flex flex-wrap justify-end gap-2 border-t border-rule px-4 py-3">
          {actions}
        </div>
      )}
    </dialog>
  );
}
