"use client";

import { ActionForm, type Entries } from "@/components/forms/action-form";
import { NumberInput, TextArea, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import type { SiteFormView } from "@/lib/usecases/save-site";
import { saveSiteAction } from "../actions";
import { SiteAccess } from "./site-access";
import type { StoredSite } from "./stored-site";

export interface SiteFormProps {
  id: string;
  stored: StoredSite | null;
  crews: SiteFormView["crews"];
  climates: SiteFormView["climates"];
  mayChange: boolean;
}

/** Adds a site or changes it: where it is, who serves it, how to get in. */
export function SiteForm(props: SiteFormProps) {
  const { id, stored, mayChange } = props;
  return (
    <div className="max-w-4xl border border-rule bg-sheet px-4 py-4">
      <fieldset disabled={!mayChange}>
        <ActionForm action={saveSiteAction} submit={stored ? "Save" : "Add the site"}>
          {(entries) => (
            <>
              <input type="hidden" name="id" value={id} />
              <Place entries={entries} {...props} />
              <SiteAccess entries={entries} stored={stored} />
              <Contact entries={entries} stored={stored} />
            </>
          )}
        </ActionForm>
      </fieldset>
    </div>
  );
}

type Part = { entries: Entries; stored: StoredSite | null };

function Place({ entries: { text }, stored, crews, climates }: Part & SiteFormProps) {
  const named = (list: readonly { id: string; name: string }[]) =>
    list.map((one) => ({ value: one.id, label: one.name }));
  return (
    <>
      <div className="grid gap-4 sm:grid-cols-[10rem_1fr]">
        <TextInput {...text("code", stored?.code)} label="Code" />
        <TextInput {...text("name", stored?.name)} label="Name" />
      </div>
      <div className="grid gap-4 sm:grid-cols-2">
        <NumberInput {...text("latitude", stored?.latitude)} label="Latitude" unit="° north" />
        <NumberInput {...text("longitude", stored?.longitude)} label="Longitude" unit="° east" />
        <Select
          {...text("crewId", stored?.crewId)}
          label="Crew"
          optional
          placeholder="None"
          options={named(crews)}
        />
        <Select
          {...text("climateId", stored?.climateId)}
          label="Climate"
          hint="Mean temperatures of the months, for capacity in the cold."
          optional
          placeholder="Not known"
          options={named(climates)}
        />
      </div>
    </>
  );
}

function Contact({ entries: { text }, stored }: Part) {
  return (
    <>
      <h2 className="caps border-t border-rule pt-3">Who must be told</h2>
      <div className="grid gap-4 sm:grid-cols-3">
        <TextInput {...text("contactName", stored?.contactName)} label="Name" optional />
        <TextInput
          {...text("contactEmail", stored?.contactEmail)}
          label="Mail"
          type="email"
          optional
        />
        <TextInput {...text("contactPhone", stored?.contactPhone)} label="Telephone" optional />
      </div>
      <TextArea {...text("driveUpNotes", stored?.driveUpNotes)} label="Drive-up notes" optional />
    </>
  );
}
