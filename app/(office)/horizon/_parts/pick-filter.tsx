"use client";

import { useRouter } from "next/navigation";
import { hrefWith } from "@/lib/present/paging";
import type { HorizonParams } from "./horizon-params";

interface PickFilterProps {
  readonly name: string;
  readonly label: string;
  readonly value: string;
  readonly choices: readonly (readonly [value: string, words: string])[];
  readonly params: HorizonParams;
}

/** A choice among many that sets one parameter of the address. */
export function PickFilter({ name, label, value, choices, params }: PickFilterProps) {
  const router = useRouter();
  return (
    <select
      aria-label={label}
      value={value}
      onChange={(event) =>
        router.push(hrefWith("/horizon", params, { [name]: event.target.value }), {
          scroll: false,
        })
      }
      className={`min-h-7 max-w-44 rounded-full border bg-sheet px-2.5 text-sm hover:border-ink ${value ? "border-ink text-ink" : "border-rule text-soft"}`}
    >
      {choices.map(([key, words]) => (
        <option key={key} value={key}>
          {words}
        </option>
      ))}
    </select>
  );
}
