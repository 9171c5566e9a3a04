"use client";

import { ActionForm, type Entries } from "@/components/forms/action-form";
import { Checkbox } from "@/components/ui/inputs";
import { Section } from "@/components/ui/page-head";
import { Select } from "@/components/ui/select";
import { ticketName } from "@/lib/present/ticket-names";
import { saveTechnicianAction } from "../actions";
import { ShiftRows, type Shift } from "./shift-rows";

const TICKETS = ["height", "boat", "confined_space", "roadside", "explosive_atmosphere"];

interface Choice {
  id: string;
  name: string;
}

export interface TechnicianFormProps {
  id: string;
  people: readonly Choice[];
  crews: readonly Choice[];
  vans: readonly Choice[];
  stored?: {
    personId: string;
    crewId: string;
    vanId: string | null;
    tickets: readonly string[];
    shifts: readonly Shift[];
  };
  workingDays: readonly number[];
  locale: string;
  readOnly?: boolean;
}

const options = (choices: readonly Choice[]) =>
  choices.map(({ id, name }) => ({ value: id, label: name }));

/** Crew, van, tickets and weekly shifts of a technician. */
export function TechnicianForm(props: TechnicianFormProps) {
  const { id, stored, readOnly = false } = props;
  return (
    <fieldset disabled={readOnly}>
      <ActionForm
        action={saveTechnicianAction}
        submit="Save crew, tickets and shifts"
        done="Crew, tickets and shifts are saved."
      >
        {(entries) => (
          <>
            <input type="hidden" name="id" value={id} />
            {!stored && <input type="hidden" name="isNew" value="on" />}
            <CrewEntries {...props} entries={entries} />
            <Section title="Tickets" aside="Sites that ask for one are planned only with it">
              <div className="grid gap-x-4 px-3 py-3 sm:grid-cols-2">
                {TICKETS.map((ticket) => {
                  const { key, ...tick } = entries.tick(
                    `ticket-${ticket}`,
                    stored?.tickets.includes(ticket),
                  );
                  const name = ticketName(ticket);
                  const label = name.charAt(0).toUpperCase() + name.slice(1);
                  return <Checkbox key={key} {...tick} label={label} />;
                })}
              </div>
            </Section>
            <Section title="Shifts" aside="Local time, the same every week">
              <ShiftRows entries={entries} {...shiftDefaults(props)} locale={props.locale} />
            </Section>
          </>
        )}
      </ActionForm>
    </fieldset>
  );
}

function CrewEntries(props: TechnicianFormProps & { entries: Entries }) {
  const { entries, stored, people, crews, vans } = props;
  return (
    <Section title="Crew and van">
      <div className="grid gap-4 px-3 py-4 sm:grid-cols-2">
        {stored ? (
          <input type="hidden" name="personId" value={stored.personId} />
        ) : (
          <Select
            label="Person"
            hint="People with the role technician"
            options={options(people)}
            placeholder="Choose a person"
            {...entries.text("personId")}
          />
        )}
        <Select
          label="Crew"
          options={options(crews)}
          placeholder="Choose a crew"
          {...entries.text("crewId", stored?.crewId)}
        />
        <Select
          label="Van"
          optional
          options={options(vans)}
          placeholder="No van"
          {...entries.text("vanId", stored?.vanId)}
        />
      </div>
    </Section>
  );
}

/** A new technician starts with the organisation's working week, 08:00 to 16:00. */
function shiftDefaults({ stored, workingDays }: TechnicianFormProps): { shifts: readonly Shift[] } {
  if (stored) return { shifts: stored.shifts };
  return {
    shifts: workingDays.map((weekday) => ({
      ...{ weekday, starts: "08:00", ends: "16:00" },
      ...{ breakStarts: null, breakEnds: null },
    })),
  };
}
