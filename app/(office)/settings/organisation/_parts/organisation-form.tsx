"use client";

import { ActionForm, type Entries } from "@/components/forms/action-form";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { Section } from "@/components/ui/page-head";
import type { OrganisationView as Organisation } from "@/lib/usecases/read-organisation";
import { WeekdayTicks } from "../../_parts/weekday-ticks";
import { changeOrganisationAction } from "../actions";
import { PhotoChoice } from "./photo-choice";

export interface OrganisationFormProps {
  organisation: Organisation;
  /** Decimals of the currency's minor unit. */
  digits: number;
  zones: readonly string[];
}

/** Name, hand, working week, prices, travel and map of the organisation. */
export function OrganisationForm({ organisation, digits, zones }: OrganisationFormProps) {
  return (
    <div className="max-w-4xl">
      <ActionForm
        action={changeOrganisationAction}
        submit="Save the organisation"
        done="The organisation is saved."
      >
        {(entries) => (
          <>
            <Hand {...{ organisation, entries, zones }} />
            <Prices {...{ organisation, entries, digits }} />
            <Travel {...{ organisation, entries }} />
            <PhotoChoice {...{ organisation, entries }} />
          </>
        )}
      </ActionForm>
    </div>
  );
}

interface PartProps {
  organisation: Organisation;
  entries: Entries;
}

const grid = "grid gap-4 px-3 py-4 sm:grid-cols-2";

function Hand({ organisation, entries, zones }: PartProps & { zones: readonly string[] }) {
  return (
    <Section title="Name and hand">
      <div className={grid}>
        <TextInput label="Name" {...entries.text("name", organisation.name)} />
        <TextInput
          label="Time zone"
          hint="All days and hours are of this place."
          list="zones"
          autoComplete="off"
          {...entries.text("timeZone", organisation.timeZone)}
        />
        <datalist id="zones">
          {zones.map((zone) => (
            <option key={zone} value={zone} />
          ))}
        </datalist>
        <TextInput
          label="Locale"
          hint="How numbers and dates are written, such as en-GB or de-DE."
          {...entries.text("locale", organisation.locale)}
        />
        <TextInput
          label="Currency"
          hint="ISO 4217 code. Amounts already stored are not converted."
          maxLength={3}
          {...entries.text("currency", organisation.currency)}
        />
        <div className="sm:col-span-2">
          <WeekdayTicks
            legend="Working week"
            entries={entries}
            stored={organisation.workingDays}
            locale={organisation.locale}
            hint="Rounds are planned on these days only."
          />
        </div>
      </div>
    </Section>
  );
}

function Prices({ organisation, entries, digits }: PartProps & { digits: number }) {
  const major = (minor: number) => (minor / 10 ** digits).toFixed(digits);
  return (
    <Section title="Prices" aside="What a round costs, and what waiting is weighed against">
      <div className={`${grid} lg:grid-cols-3`}>
        <NumberInput
          label="Crew"
          unit={`${organisation.currency} / h`}
          {...entries.text("crewCostPerHour", major(organisation.crewCostMinorPerHour))}
        />
        <NumberInput
          label="Overtime"
          unit={`${organisation.currency} / h`}
          {...entries.text("overtimeCostPerHour", major(organisation.overtimeCostMinorPerHour))}
        />
        <NumberInput
          label="Driving"
          unit={`${organisation.currency} / km`}
          {...entries.text("travelCostPerKm", major(organisation.travelCostMinorPerKm))}
        />
      </div>
    </Section>
  );
}

function Travel({ organisation, entries }: PartProps) {
  return (
    <Section title="Travel and map">
      <div className={grid}>
        <NumberInput
          label="Mean road speed"
          unit="km/h"
          {...entries.text("roadSpeedKmh", organisation.roadSpeedKmh)}
        />
        <NumberInput
          label="Detour factor"
          hint="Road length over the straight line, 1 to 5."
          unit="×"
          {...entries.text("detourFactor", organisation.detourFactor)}
        />
        <TextInput
          label="Travel table service"
          hint={
            organisation.roadsSetAt
              ? "An OSRM-compatible address; without it times come from the organisation's own roads."
              : "An OSRM-compatible address; without it times come from speed and detour."
          }
          optional
          type="url"
          {...entries.text("travelTableUrl", organisation.travelTableUrl)}
        />
        <TextInput
          label="Map tiles"
          hint="With {z}, {x} and {y}. Without it the map shows the drawn district only."
          optional
          {...entries.text("mapTileUrl", organisation.mapTileUrl)}
        />
      </div>
    </Section>
  );
}
