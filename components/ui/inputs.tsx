import type { InputHTMLAttributes, ReactNode, TextareaHTMLAttributes } from "react";
import { controlClass, Field, type FieldProps } from "@/components/ui/field";

type Around = Omit<FieldProps, "children">;
type Native = Omit<InputHTMLAttributes<HTMLInputElement>, "name" | "id">;

export interface TextInputProps extends Around, Native {}

/** One line of text. Give `defaultValue` what was typed last, also after an error. */
export function TextInput({ name, label, hint, error, optional, id, ...rest }: TextInputProps) {
  return (
    <Field {...{ name, label, hint, error, optional, id }}>
      {(wiring) => (
        <input
          type="text"
          required={!optional}
          {...rest}
          {...wiring}
          name={name}
          className={controlClass}
        />
      )}
    </Field>
  );
}

export interface TextAreaProps
  extends Around, Omit<TextareaHTMLAttributes<HTMLTextAreaElement>, "name" | "id"> {}

/** Several lines of text. */
export function TextArea({ name, label, hint, error, optional, id, ...rest }: TextAreaProps) {
  return (
    <Field {...{ name, label, hint, error, optional, id }}>
      {(wiring) => (
        <textarea
          rows={3}
          required={!optional}
          {...rest}
          {...wiring}
          name={name}
          className={controlClass}
        />
      )}
    </Field>
  );
}

export interface NumberInputProps extends Around, Native {
  /** The unit beside the number: "V", "mA", "Ah", "days". */
  unit: string;
}

/**
 * A number with its unit beside it. It is a text control with a decimal keypad, so that "3,48" and
 * "3.48" both survive to the parser that knows the person's locale.
 */
export function NumberInput(props: NumberInputProps) {
  const { name, label, hint, error, optional, id, unit, ...rest } = props;
  return (
    <Field {...{ name, label, hint, error, optional, id }}>
      {(wiring) => (
        <div className="flex items-baseline gap-2">
          <input
            type="text"
            inputMode="decimal"
            autoComplete="off"
            required={!optional}
            {...rest}
            {...wiring}
            aria-describedby={[wiring["aria-describedby"], `${wiring.id}-unit`]
              .filter(Boolean)
              .join(" ")}
            name={name}
            className={`${controlClass} max-w-40 text-right`}
          />
          <span id={`${wiring.id}-unit`} className="text-soft">
            {unit}
          </span>
        </div>
      )}
    </Field>
  );
}

export interface CheckboxProps extends Native {
  name: string;
  label: ReactNode;
  hint?: ReactNode;
  id?: string;
}

/** A yes or no with its words beside it; the whole line is the target. */
export function Checkbox({ name, label, hint, id, ...rest }: CheckboxProps) {
  const controlId = id ?? `field-${name}`;
  return (
    <div className="flex min-h-8 items-start gap-2.5 in-data-[surface=field]:min-h-12 in-data-[surface=field]:items-center">
      <input
        type="checkbox"
        {...rest}
        id={controlId}
        name={name}
        aria-describedby={hint ? `${controlId}-hint` : undefined}
        className="mt-0.5 size-4.5 shrink-0 accent-spruce in-data-[surface=field]:mt-0 in-data-[surface=field]:size-7"
      />
      <div className="min-w-0">
        <label htmlFor={controlId}>{label}</label>
        {hint && (
          <div id={`${controlId}-hint`} className="text-sm text-soft">
            {hint}
          </div>
        )}
      </div>
    </div>
  );
}
