"use client";

import { afterKey, ERASE } from "@/lib/present/keypad-entry";

export interface KeypadProps {
  /** The digits typed so far, with `decimalSign` where it stands. */
  value: string;
  onChange: (value: string) => void;
  /** "." or ",", as the person writes numbers. */
  decimalSign?: "." | ",";
  /** Digits allowed behind the decimal sign. */
  decimals?: number;
  /** What is typed: "Voltage in volts". */
  label: string;
}

/** A keypad for wet gloves; it never opens the phone's own keyboard. */
export function Keypad(props: KeypadProps) {
  const { value, onChange, decimalSign = ".", decimals = 3, label } = props;
  const keys = ["1", "2", "3", "4", "5", "6", "7", "8", "9", decimalSign, "0", ERASE];
  return (
    <div role="group" aria-label={label} className="grid grid-cols-3 gap-2">
      {keys.map((key) => (
        <button
          key={key}
          type="button"
          aria-label={
            key === ERASE ? "Erase the last digit" : key === decimalSign ? "Decimal sign" : key
          }
          onClick={() => onChange(afterKey(value, key, decimalSign, decimals))}
          className="min-h-15 touch-manipulation rounded border border-soft bg-sheet text-2xl font-medium select-none active:bg-hair"
        >
          {key}
        </button>
      ))}
    </div>
  );
}
