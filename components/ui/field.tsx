import type { ReactNode } from "react";

/** What a control needs to be tied to its label, hint and error. */
export interface ControlWiring {
  id: string;
  "aria-describedby": string | undefined;
  "aria-invalid": true | undefined;
}

export interface FieldProps {
  name: string;
  label: string;
  /** What to type, in a few words; stays while typing. */
  hint?: ReactNode;
  /** What is wrong and how to mend it. */
  error?: string | undefined;
  /** Say that the field may be left empty. */
  optional?: boolean;
  /** Needed when two fields of one name share a page. */
  id?: string;
  children: (wiring: ControlWiring) => ReactNode;
}

/**
 * Label, error and hint around one control, which keeps what was typed. Label and control come first:
 * side by side, fields with and without a hint stand on one line.
 */
export function Field({ name, label, hint, error, optional, id, children }: FieldProps) {
  const controlId = id ?? `field-${name}`;
  const described = [hint && `${controlId}-hint`, error && `${controlId}-error`]
    .filter(Boolean)
    .join(" ");
  return (
    <div className="flex min-w-0 flex-col gap-1">
      <label htmlFor={controlId} className="font-medium">
        {label}
        {optional && <span className="font-normal text-soft"> (optional)</span>}
      </label>
      {children({
        id: controlId,
        "aria-describedby": described || undefined,
        "aria-invalid": error ? true : undefined,
      })}
      {error && (
        <div id={`${controlId}-error`} className="text-sm font-medium text-brick-ink">
          {error}
        </div>
      )}
      {hint && (
        <div id={`${controlId}-hint`} className="text-sm text-soft">
          {hint}
        </div>
      )}
    </div>
  );
}

/** The ruled look shared by all controls. */
export const controlClass =
  "min-h-9 w-full rounded border border-soft bg-sheet px-2.5 py-1.5 text-ink placeholder:text-soft aria-invalid:border-2 aria-invalid:border-brick-line disabled:border-rule disabled:bg-hair disabled:text-soft in-data-[surface=field]:min-h-14 in-data-[surface=field]:text-lg";
