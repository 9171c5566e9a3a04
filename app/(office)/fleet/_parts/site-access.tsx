"use client";

import type { Entries } from "@/components/forms/action-form";
import { RowList } from "@/components/forms/row-list";
import { Checkbox, NumberInput, TextInput } from "@/components/ui/inputs";
import { plain } from "./fleet-words";
import type { StoredSite } from "./stored-site";

const HAZARDS = [
  ...["water", "height", "confined_space", "roadside"],
  ...["explosive_atmosphere", "lone_working", "livestock", "soft_ground"],
];
const TICKETS = ["height", "boat", "confined_space", "roadside", "explosive_atmosphere"];

export interface SiteAccessProps {
  entries: Entries;
  stored: StoredSite | null;
}

/** How to get in: notice, hours, closed seasons, key, hazards and tickets. */
export function SiteAccess({ entries, stored }: SiteAccessProps) {
  const { text, fault } = entries;
  return (
    <>
      <h2 className="caps border-t border-rule pt-3">The way in</h2>
      <div className="grid gap-4 sm:grid-cols-4">
        <NumberInput {...text("noticeDays", stored?.noticeDays ?? 0)} label="Notice" unit="days" />
        <TextInput
          {...text("opens", stored?.opens?.slice(0, 5))}
          label="Opens"
          type="time"
          optional
        />
        <TextInput
          {...text("closes", stored?.closes?.slice(0, 5))}
          label="Closes"
          type="time"
          optional
        />
        <TextInput {...text("keyCode", stored?.keyCode)} label="Key" optional />
      </div>
      <RowList
        legend="Closed seasons, every year"
        noun="season"
        add="Add a season"
        count={stored?.closures.length ?? 0}
      >
        {(n) => (
          <>
            <TextInput
              {...text(`closures.${n}.firstMonthDay`, stored?.closures[n]?.firstMonthDay)}
              label="From (MM-DD)"
              placeholder="03-15"
            />
            <TextInput
              {...text(`closures.${n}.lastMonthDay`, stored?.closures[n]?.lastMonthDay)}
              label="To (MM-DD)"
              placeholder="07-01"
            />
            <TextInput
              {...text(`closures.${n}.reason`, stored?.closures[n]?.reason)}
              label="Why"
              optional
            />
          </>
        )}
      </RowList>
      <div className="grid gap-4 sm:grid-cols-2">
        <Ticks
          legend="Hazards"
          prefix="hazard"
          words={HAZARDS}
          stored={stored?.hazards}
          {...entries}
        />
        <Ticks
          legend="Tickets needed"
          prefix="ticket"
          words={TICKETS}
          stored={stored?.tickets}
          {...entries}
        />
      </div>
      {fault("closures") && <p className="text-brick-ink">{fault("closures")}</p>}
    </>
  );
}

interface TicksProps extends Pick<Entries, "tick"> {
  legend: string;
  prefix: string;
  words: readonly string[];
  stored: readonly string[] | undefined;
}

function Ticks({ legend, prefix, words, stored, tick }: TicksProps) {
  return (
    <fieldset>
      <legend className="mb-1 font-medium">{legend}</legend>
      <div className="grid gap-x-4 sm:grid-cols-2">
        {words.map((word) => {
          const { key, ...entry } = tick(`${prefix}-${word}`, stored?.includes(word) ?? false);
          return <Checkbox key={key} {...entry} label={plain(word)} />;
        })}
      </div>
    </fieldset>
  );
}
