import type { SelectHTMLAttributes } from "react";
import { controlClass, Field, type FieldProps } from "@/components/ui/field";

export interface SelectOption {
  value: string;
  label: string;
  disabled?: boolean;
}

export interface SelectProps
  extends
    Omit<FieldProps, "children">,
    Omit<SelectHTMLAttributes<HTMLSelectElement>, "name" | "id"> {
  options: readonly SelectOption[];
  /** A first, empty choice such as "Choose a site". */
  placeholder?: string;
}

/** One choice of several. */
export function Select(props: SelectProps) {
  const { name, label, hint, error, optional, id, options, placeholder, ...rest } = props;
  return (
    <Field {...{ name, label, hint, error, optional, id }}>
      {(wiring) => (
        <select
          // React resets a form after its action; a select only follows a new defaultValue anew.
          key={String(rest.defaultValue ?? "")}
          required={!optional}
          {...rest}
          {...wiring}
          name={name}
          className={controlClass}
        >
          {placeholder !== undefined && <option value="">{placeholder}</option>}
          {options.map((option) => (
            <option key={option.value} value={option.value} disabled={option.disabled}>
              {option.label}
            </option>
          ))}
        </select>
      )}
    </Field>
  );
}
