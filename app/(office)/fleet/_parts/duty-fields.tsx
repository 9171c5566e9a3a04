"use client";

import { useRef, useState } from "react";
import type { Entries } from "@/components/forms/action-form";
import { RowList } from "@/components/forms/row-list";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { averageUa, peakUa } from "@/lib/present/duty-cycle";
import { formatCurrent } from "@/lib/present/format-quantity";

interface TypedState {
  readonly name: string;
  readonly current: string;
  readonly seconds: string;
}

export interface DutyFieldsProps {
  entries: Entries;
  states: readonly TypedState[];
  locale: string;
}

/** The duty cycle, with the average and the peak that follow from what is typed. */
export function DutyFields({ entries: { text, fault }, states, locale }: DutyFieldsProps) {
  const box = useRef<HTMLDivElement>(null);
  const [typed, setTyped] = useState(states);
  const duty = typed.map((s) => ({
    name: s.name,
    currentUa: number(s.current) * 1000,
    durationMs: number(s.seconds) * 1000,
  }));
  const seconds = duty.reduce((sum, s) => sum + s.durationMs, 0) / 1000;
  return (
    <div
      ref={box}
      className="border-t border-rule pt-3"
      onInput={() => setTyped(read(box.current))}
    >
      <RowList
        legend="Duty cycle: one period"
        noun="state"
        add="Add a state"
        count={Math.max(1, states.length)}
      >
        {(n) => (
          <>
            <TextInput
              {...text(`states.${n}.name`, states[n]?.name)}
              label="State"
              placeholder="sleep"
            />
            <NumberInput
              {...text(`states.${n}.currentMilliamps`, states[n]?.current)}
              label="Current"
              unit="mA"
            />
            <NumberInput
              {...text(`states.${n}.seconds`, states[n]?.seconds)}
              label="Time"
              unit="s"
            />
          </>
        )}
      </RowList>
      {fault("states") && <p className="font-medium text-brick-ink">{fault("states")}</p>}
      <p role="status" className="mt-3">
        {seconds > 0 ? (
          <>
            A period of {Math.round(seconds * 1000) / 1000} s draws{" "}
            <b>{formatCurrent(averageUa(duty), locale)}</b> on average and{" "}
            <b>{formatCurrent(peakUa(duty), locale)}</b> at the peak.
          </>
        ) : (
          "Average and peak show here as you type."
        )}
      </p>
    </div>
  );
}

/** What is typed may be half a number: what cannot be read yet counts as nothing. */
function number(text: string): number {
  const value = Number(text.trim().replace(",", "."));
  return Number.isFinite(value) && value > 0 ? value : 0;
}

function read(box: HTMLElement | null): TypedState[] {
  const rows = new Map<string, Record<string, string>>();
  for (const input of box?.querySelectorAll<HTMLInputElement>("input[name^='states.']") ?? []) {
    const [, row = "", key = ""] = input.name.split(".");
    rows.set(row, { ...rows.get(row), [key]: input.value });
  }
  return [...rows.values()].map((row) => ({
    name: row.name ?? "",
    current: row.currentMilliamps ?? "",
    seconds: row.seconds ?? "",
  }));
}
