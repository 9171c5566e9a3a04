"use client";

import { useRouter } from "next/navigation";
import { hrefWith } from "@/lib/present/paging";

export interface PickFilterProps {
  path: string;
  name: string;
  /** Read out: "Device model". */
  label: string;
  /** The first choice, which filters nothing: "All models". */
  all: string;
  choices: readonly { readonly value: string; readonly label: string }[];
  params: Readonly<Record<string, string | undefined>>;
}

/** A choice among many that sets one parameter of the address. */
export function PickFilter({ path, name, label, all, choices, params }: PickFilterProps) {
  const router = useRouter();
  const value = params[name] ?? "";
  return (
    <select
      aria-label={label}
      value={value}
      onChange={(event) =>
        router.push(hrefWith(path, params, { [name]: event.target.value }), { scroll: false })
      }
      className={`min-h-7 max-w-44 rounded-full border bg-sheet px-2.5 text-sm hover:border-ink ${value ? "border-ink text-ink" : "border-soft text-soft"}`}
    >
      <option value="">{all}</option>
      {choices.map((choice) => (
        <option key={choice.value} value={choice.value}>
          {choice.label}
        </option>
      ))}
    </select>
  );
}
