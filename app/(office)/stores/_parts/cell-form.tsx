"use client";

import { ActionForm, type Entries } from "@/components/forms/action-form";
import { RowList } from "@/components/forms/row-list";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import { CHEMISTRY_WORDS, choices } from "../../fleet/_parts/fleet-words";
import { saveCellTypeAction } from "../actions";

const FIGURES = [
  ["nominalVolts", "Nominal voltage of a cell", "V", false],
  ["ratedCapacityAh", "Rated capacity", "Ah", false],
  ["ratedMilliamps", "Rated at a current of", "mA", false],
  ["ratedCutoffVolts", "Rated down to", "V", false],
  ["ratedTemperatureC", "Rated at a temperature of", "°C", false],
  ["selfDischargePercent", "Self-discharge a year", "%", false],
  ["resistanceOhms", "Resistance, fresh", "Ω", false],
  ["maxPulseMilliamps", "Largest pulse", "mA", true],
  ["massGrams", "Mass", "g", true],
  ["shelfLifeMonths", "Shelf life", "months", true],
  ["reorderPoint", "Order below", "cells", false],
  ["leadTimeDays", "Delivery takes", "days", false],
] as const;

const POINT = [
  ["milliamps", "Current", "mA"],
  ["cutoffVolts", "Down to", "V"],
  ["temperatureC", "At", "°C"],
  ["capacityAh", "Gives", "Ah"],
] as const;

type Figure = (typeof FIGURES)[number][0] | "designation" | "name" | "size" | "chemistry";
type Point = Record<(typeof POINT)[number][0] | "source", string>;
export type StoredCell = Record<Figure | "unitCost", string> & {
  readonly points: readonly Point[];
};

export interface CellFormProps {
  id: string;
  stored: StoredCell | null;
  currency: string;
  mayChange: boolean;
}

/** Adds a cell type or changes it, with its capacity table. */
export function CellForm({ id, stored, currency, mayChange }: CellFormProps) {
  return (
    <div className="max-w-4xl border border-rule bg-sheet px-4 py-4">
      <fieldset disabled={!mayChange}>
        <ActionForm action={saveCellTypeAction} submit={stored ? "Save" : "Add the cell type"}>
          {(entries) => (
            <>
              <input type="hidden" name="id" value={id} />
              <Names entries={entries} stored={stored} />
              <div className="grid gap-4 border-t border-rule pt-4 sm:grid-cols-3">
                {FIGURES.map(([name, label, unit, optional]) => (
                  <NumberInput
                    key={name}
                    {...entries.text(name, stored?.[name] ?? USUAL[name])}
                    {...{ label, unit, optional }}
                  />
                ))}
                <NumberInput
                  {...entries.text("unitCost", stored?.unitCost ?? "0")}
                  label="A cell costs"
                  unit={currency}
                />
              </div>
              <Points entries={entries} stored={stored} />
            </>
          )}
        </ActionForm>
      </fieldset>
    </div>
  );
}

const USUAL: Partial<Record<Figure, string>> = {
  ratedTemperatureC: "20",
  reorderPoint: "0",
  leadTimeDays: "7",
};

type Part = { entries: Entries; stored: StoredCell | null };

function Names({ entries: { text }, stored }: Part) {
  return (
    <div className="grid gap-4 sm:grid-cols-2">
      <TextInput
        {...text("designation", stored?.designation)}
        label="Designation"
        hint="IEC 60086 where there is one: LR20, ER34615."
      />
      <TextInput {...text("name", stored?.name)} label="Name" optional />
      <Select
        {...text("chemistry", stored?.chemistry)}
        label="Chemistry"
        placeholder="Choose"
        options={choices(CHEMISTRY_WORDS)}
      />
      <TextInput {...text("size", stored?.size)} label="Size" optional />
    </div>
  );
}

function Points({ entries: { text }, stored }: Part) {
  return (
    <div className="border-t border-rule pt-4">
      <RowList
        legend="Capacity table: what one cell gives"
        noun="point"
        add="Add a point"
        count={stored?.points.length ?? 0}
      >
        {(n) => (
          <>
            {POINT.map(([key, label, unit]) => (
              <div key={key} className="w-32">
                <NumberInput
                  {...text(`points.${n}.${key}`, stored?.points[n]?.[key])}
                  {...{ label, unit }}
                />
              </div>
            ))}
            <TextInput
              {...text(`points.${n}.source`, stored?.points[n]?.source)}
              label="Source"
              optional
            />
          </>
        )}
      </RowList>
    </div>
  );
}
