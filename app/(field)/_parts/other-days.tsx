import { formatDay } from "@/lib/present/format-day";
import type { DayPack } from "@/lib/sync/day-pack";
import { ChipPage } from "./field-chip";

/** The other days with a round on this phone. */
export function OtherDays({ day, shown, today }: { day: DayPack; shown: string; today: string }) {
  const days = [...new Set([today, ...day.rounds.map((round) => round.day)])].sort();
  if (days.length < 2) return null;
  return (
    <nav aria-label="Other days" className="flex flex-wrap gap-2">
      {days.map((candidate) => (
        <ChipPage
          key={candidate}
          href={candidate === today ? "/today" : `/today?day=${candidate}`}
          on={candidate === shown}
        >
          {candidate === today
            ? "Today"
            : formatDay(candidate, day.organisation.locale, { weekday: true, today })}
        </ChipPage>
      ))}
    </nav>
  );
}
