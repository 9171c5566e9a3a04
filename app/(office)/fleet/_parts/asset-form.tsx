"use client";

import { ActionForm } from "@/components/forms/action-form";
import { NumberInput, TextArea, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import { saveAssetAction } from "../actions";

export interface AssetFormProps {
  id: string;
  stored: {
    readonly tag: string;
    readonly name: string;
    readonly siteCode: string;
    readonly deviceModelId: string;
    readonly silenceCost: string;
    readonly firmware: string;
    readonly note: string;
  } | null;
  sites: readonly { readonly code: string; readonly name: string }[];
  models: readonly { readonly id: string; readonly name: string }[];
  currency: string;
}

/** Adds an asset or changes it. */
export function AssetForm({ id, stored, sites, models, currency }: AssetFormProps) {
  return (
    <div className="max-w-2xl border border-rule bg-sheet px-4 py-4">
      <ActionForm action={saveAssetAction} submit={stored ? "Save" : "Add the asset"}>
        {({ text }) => (
          <>
            <input type="hidden" name="id" value={id} />
            <div className="grid gap-4 sm:grid-cols-[12rem_1fr]">
              <TextInput {...text("tag", stored?.tag)} label="Tag" hint="As on the device." />
              <TextInput {...text("name", stored?.name)} label="Name" hint="Sluice 9 level gauge" />
            </div>
            <TextInput
              {...text("siteCode", stored?.siteCode)}
              label="Site"
              hint="Type part of its code or name and choose."
              list="site-codes"
              autoComplete="off"
            />
            <datalist id="site-codes">
              {sites.map((site) => (
                <option key={site.code} value={site.code}>
                  {site.name}
                </option>
              ))}
            </datalist>
            <Select
              {...text("deviceModelId", stored?.deviceModelId)}
              label="Device model"
              placeholder="Choose a model"
              options={models.map((m) => ({ value: m.id, label: m.name }))}
            />
            <div className="grid gap-4 sm:grid-cols-2">
              <NumberInput
                {...text("silenceCostPerHour", stored?.silenceCost)}
                label="Cost of an hour without data"
                hint="Empty: the device model’s figure."
                unit={currency}
                optional
              />
              <TextInput {...text("firmware", stored?.firmware)} label="Firmware" optional />
            </div>
            <TextArea {...text("note", stored?.note)} label="Note" optional />
          </>
        )}
      </ActionForm>
    </div>
  );
}
