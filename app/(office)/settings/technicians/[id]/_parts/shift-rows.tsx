import type { Entries } from "@/components/forms/action-form";
import { controlClass } from "@/components/ui/field";
import { Checkbox } from "@/components/ui/inputs";
import { WEEKDAYS, weekdayName } from "@/lib/present/weekday-names";

export interface Shift {
  weekday: number;
  /** "HH:MM" or "HH:MM:SS", local time. */
  starts: string;
  ends: string;
  breakStarts: string | null;
  breakEnds: string | null;
}

export interface ShiftRowsProps {
  entries: Entries;
  shifts: readonly Shift[];
  locale: string;
}

/** Seven lines: works that day, from, to, and a break. */
export function ShiftRows({ entries, shifts, locale }: ShiftRowsProps) {
  return (
    <div className="divide-y divide-hair">
      {WEEKDAYS.map((day) => {
        const shift = shifts.find((one) => one.weekday === day);
        const { key, ...tick } = entries.tick(`day-${day}`, shift !== undefined);
        const name = weekdayName(day, locale);
        return (
          <div key={day} className="grid items-center gap-x-6 gap-y-1.5 px-3 py-1.5 sm:flex">
            <div className="sm:w-36">
              <Checkbox key={key} {...tick} label={name} />
            </div>
            <div className={hours}>
              <span className="text-soft sm:hidden">works</span>
              <Hour
                {...{ entries, day, edge: "starts", label: `${name} from` }}
                time={shift?.starts}
              />
              <span className="text-soft">to</span>
              <Hour {...{ entries, day, edge: "ends", label: `${name} to` }} time={shift?.ends} />
            </div>
            <div className={hours}>
              <span className="text-soft">break</span>
              <Hour
                {...{ entries, day, edge: "breakStarts", label: `${name}, break from` }}
                time={shift?.breakStarts ?? undefined}
              />
              <span className="text-soft">to</span>
              <Hour
                {...{ entries, day, edge: "breakEnds", label: `${name}, break to` }}
                time={shift?.breakEnds ?? undefined}
              />
            </div>
          </div>
        );
      })}
      <ShiftFault entries={entries} />
    </div>
  );
}

/** On a phone the hours of a day stand under its name, each pair on one line. */
const hours = "grid grid-cols-[3rem_1fr_auto_1fr] items-center gap-2 sm:flex sm:gap-3";

interface HourProps {
  entries: Entries;
  day: number;
  edge: "starts" | "ends" | "breakStarts" | "breakEnds";
  label: string;
  time: string | undefined;
}

/** What a day that was free before starts with; nobody has a break unasked. */
const USUAL = { starts: "08:00", ends: "16:00", breakStarts: "", breakEnds: "" };

function Hour({ entries, day, edge, label, time }: HourProps) {
  const { name, defaultValue } = entries.text(`${edge}-${day}`, time?.slice(0, 5) ?? USUAL[edge]);
  return (
    <input
      type="time"
      aria-label={label}
      name={name}
      defaultValue={defaultValue}
      className={`${controlClass} sm:w-32`}
    />
  );
}

/** Faults come by place among the ticked days, "shifts.0.ends". */
function ShiftFault({ entries }: { entries: Entries }) {
  const edges = ["starts", "ends", "breakStarts", "breakEnds"];
  const places = [0, 1, 2, 3, 4, 5, 6].flatMap((i) => edges.map((edge) => `shifts.${i}.${edge}`));
  const fault = ["shifts", ...places].map((field) => entries.fault(field)).find(Boolean);
  return fault ? <p className="px-3 py-2 font-medium text-brick-ink">{fault}</p> : null;
}
