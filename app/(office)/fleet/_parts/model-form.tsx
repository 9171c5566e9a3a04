"use client";

import { ActionForm, type Entries } from "@/components/forms/action-form";
import { Checkbox, NumberInput, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import type { DeviceModelFormView } from "@/lib/usecases/save-device-model";
import { saveDeviceModelAction } from "../actions";
import { DutyFields } from "./duty-fields";

type Model = NonNullable<DeviceModelFormView["model"]>;
export type StoredModel = Omit<Model, "states"> & {
  readonly cutoff: string;
  readonly silenceCost: string;
  readonly states: readonly { name: string; current: string; seconds: string }[];
};

export interface ModelFormProps {
  id: string;
  stored: StoredModel | null;
  cellTypes: DeviceModelFormView["cellTypes"];
  locale: string;
  currency: string;
  mayChange: boolean;
}

/** Adds a device model or changes it; average and peak draw show while typing. */
export function ModelForm(props: ModelFormProps) {
  const { id, stored, locale, mayChange } = props;
  return (
    <div className="max-w-4xl border border-rule bg-sheet px-4 py-4">
      <fieldset disabled={!mayChange}>
        <ActionForm action={saveDeviceModelAction} submit={stored ? "Save" : "Add the model"}>
          {(entries) => (
            <>
              <input type="hidden" name="id" value={id} />
              <Figures entries={entries} {...props} />
              <DutyFields entries={entries} states={stored?.states ?? []} locale={locale} />
              <Cells entries={entries} {...props} />
            </>
          )}
        </ActionForm>
      </fieldset>
    </div>
  );
}

type Part = ModelFormProps & { entries: Entries };

function Figures({ entries: { text }, stored, currency }: Part) {
  return (
    <>
      <TextInput {...text("name", stored?.name)} label="Name" />
      <div className="grid gap-4 sm:grid-cols-3">
        <NumberInput
          {...text("cutoffVolts", stored?.cutoff)}
          label="Cut-off of the pack"
          hint="Under its peak current."
          unit="V"
        />
        <NumberInput
          {...text("series", stored?.series ?? 1)}
          label="In series"
          hint="Cells one after another."
          unit="cells"
        />
        <NumberInput
          {...text("parallel", stored?.parallel ?? 1)}
          label="In parallel"
          hint="Strings beside each other."
          unit="strings"
        />
        <NumberInput
          {...text("swapMinutes", stored?.swapMinutes ?? 15)}
          label="A swap takes"
          unit="min"
        />
        <NumberInput
          {...text("readMinutes", stored?.readMinutes ?? 5)}
          label="A reading takes"
          unit="min"
        />
        <NumberInput
          {...text("silenceCostPerHour", stored?.silenceCost ?? "0")}
          label="An hour without data costs"
          unit={currency}
        />
        <NumberInput
          {...text("habitIntervalDays", stored?.habitIntervalDays)}
          label="Swapped by habit every"
          hint="To compare with; empty: no habit."
          unit="days"
          optional
        />
      </div>
    </>
  );
}

function Cells({ entries: { text, tick, fault }, stored, cellTypes }: Part) {
  const shown = cellTypes.filter(
    (c) => !c.retired || stored?.cells.some((own) => own.cellTypeId === c.id),
  );
  const preferred = stored?.cells.find((c) => c.preferred)?.cellTypeId;
  return (
    <fieldset className="border-t border-rule pt-3">
      <legend className="sr-only">Cells it takes</legend>
      <h2 className="caps mb-2">Cells it takes</h2>
      <div className="mb-3 grid gap-x-4 sm:grid-cols-3">
        {shown.map((cell) => {
          const has = stored?.cells.some((c) => c.cellTypeId === cell.id) ?? false;
          const { key, ...entry } = tick(`cell-${cell.id}`, has);
          return <Checkbox key={key} {...entry} label={cell.designation} hint={cell.name} />;
        })}
      </div>
      {fault("cellTypeIds") && (
        <p className="mb-2 font-medium text-brick-ink">{fault("cellTypeIds")}</p>
      )}
      <Select
        {...text("preferredId", preferred)}
        label="Preferred"
        optional
        placeholder="None"
        options={shown.map((c) => ({ value: c.id, label: c.designation }))}
      />
    </fieldset>
  );
}
