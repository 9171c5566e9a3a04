import type { Entries } from "@/components/forms/action-form";
import { Checkbox } from "@/components/ui/inputs";
import { WEEKDAYS, weekdayName } from "@/lib/present/weekday-names";

export interface WeekdayTicksProps {
  legend: string;
  entries: Entries;
  stored: readonly number[];
  locale: string;
  hint?: string;
}

/** Seven ticks, "day-1" (Monday) to "day-7". */
export function WeekdayTicks({ legend, entries, stored, locale, hint }: WeekdayTicksProps) {
  const fault = entries.fault("weekdays") ?? entries.fault("workingDays");
  return (
    <fieldset>
      <legend className="mb-1 font-medium">{legend}</legend>
      {hint && <p className="mb-1 text-sm text-soft">{hint}</p>}
      <div className="flex flex-wrap gap-x-5">
        {WEEKDAYS.map((day) => {
          const { key, ...tick } = entries.tick(`day-${day}`, stored.includes(day));
          return <Checkbox key={key} {...tick} label={weekdayName(day, locale, "short")} />;
        })}
      </div>
      {fault && <p className="text-sm font-medium text-brick-ink">{fault}</p>}
    </fieldset>
  );
}
