"use client";

import { ActionForm } from "@/components/forms/action-form";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import { EditDialog } from "../../_parts/edit-dialog";
import { saveCrewAction, saveDepotAction, saveVanAction } from "../actions";

interface Choice {
  id: string;
  name: string;
}
const options = (choices: readonly Choice[]) =>
  choices.map(({ id, name }) => ({ value: id, label: name }));
/** The button's words: a new thing, or a change to one that has a name. */
const opener = (what: string, stored?: { name: string }) =>
  stored
    ? { label: "Change", name: `Change ${stored.name}`, title: stored.name }
    : { label: `Add a ${what}…`, title: `Add a ${what}`, kind: "plain" as const };

interface DepotDialogProps {
  id: string;
  stored?: { name: string; latitude: number; longitude: number };
}

/** Adds a depot or changes it. */
export function DepotDialog({ id, stored }: DepotDialogProps) {
  return (
    <EditDialog {...opener("depot", stored)}>
      {(close) => (
        <ActionForm action={saveDepotAction} submit="Save" done="Saved." onDone={close}>
          {(entries) => (
            <>
              <input type="hidden" name="id" value={id} />
              <TextInput label="Name" {...entries.text("name", stored?.name)} />
              <NumberInput
                label="Latitude"
                hint="WGS 84, decimal degrees"
                unit="° N"
                {...entries.text("latitude", stored?.latitude)}
              />
              <NumberInput
                label="Longitude"
                unit="° E"
                {...entries.text("longitude", stored?.longitude)}
              />
            </>
          )}
        </ActionForm>
      )}
    </EditDialog>
  );
}

interface CrewDialogProps {
  id: string;
  depots: readonly Choice[];
  stored?: { name: string; depotId: string };
}

/** Adds a crew or changes it. */
export function CrewDialog({ id, depots, stored }: CrewDialogProps) {
  return (
    <EditDialog {...opener("crew", stored)}>
      {(close) => (
        <ActionForm action={saveCrewAction} submit="Save" done="Saved." onDone={close}>
          {(entries) => (
            <>
              <input type="hidden" name="id" value={id} />
              <TextInput label="Name" {...entries.text("name", stored?.name)} />
              <Select
                label="Depot"
                hint="Where its rounds start and end"
                options={options(depots)}
                placeholder="Choose a depot"
                {...entries.text("depotId", stored?.depotId)}
              />
            </>
          )}
        </ActionForm>
      )}
    </EditDialog>
  );
}

interface VanDialogProps {
  id: string;
  crews: readonly Choice[];
  stored?: { name: string; crewId: string; cellCapacity: number | null };
}

/** Adds a van or changes it. */
export function VanDialog({ id, crews, stored }: VanDialogProps) {
  return (
    <EditDialog {...opener("van", stored)}>
      {(close) => (
        <ActionForm action={saveVanAction} submit="Save" done="Saved." onDone={close}>
          {(entries) => (
            <>
              <input type="hidden" name="id" value={id} />
              <TextInput label="Name or plate" {...entries.text("name", stored?.name)} />
              <Select
                label="Crew"
                options={options(crews)}
                placeholder="Choose a crew"
                {...entries.text("crewId", stored?.crewId)}
              />
              <NumberInput
                label="Holds at most"
                optional
                unit="cells"
                {...entries.text("cellCapacity", stored?.cellCapacity)}
              />
            </>
          )}
        </ActionForm>
      )}
    </EditDialog>
  );
}
