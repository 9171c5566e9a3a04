"use client";

import { ActionForm } from "@/components/forms/action-form";
import { applyImportAction } from "../actions";

export interface ApplyFormProps {
  importId: string;
  counts: { readonly new: number; readonly changed: number; readonly refused: number };
}

/** Imports every sound row; says how many are left out. */
export function ApplyForm({ importId, counts }: ApplyFormProps) {
  const rows = counts.new + counts.changed;
  if (rows === 0) return <p className="pb-2 text-soft">There is nothing to import.</p>;
  const what = rows === 1 ? "1 row" : `${rows} rows`;
  const left = counts.refused > 0 ? `, leave ${counts.refused} out` : "";
  return (
    <ActionForm action={applyImportAction} submit={`Import ${what}${left}`} busy="Asking…">
      <input type="hidden" name="importId" value={importId} />
    </ActionForm>
  );
}
