import { Notice } from "@/components/ui/notice";
import { loadOfRound } from "@/lib/offline/day";
import type { DayPack, DayRound } from "@/lib/sync/day-pack";
import { TICKET_WORDS } from "./field-words";

/** The load in one line: "Load: 10 LR20 · 4 LR6 · key 14". */
export function loadLine(day: DayPack, round: DayRound): string {
  const { cells, keys } = loadOfRound(day, round);
  const parts = [
    ...cells.map((line) => `${line.needed} ${line.designation}`),
    ...keys.map((key) => `key ${key}`),
  ];
  return parts.length > 0 ? `Load: ${parts.join(" · ")}` : "Nothing left to load.";
}

/** What the open stops need against what lies in the van. */
export function LoadList({ day, round }: { day: DayPack; round: DayRound }) {
  const { cells, keys, tickets } = loadOfRound(day, round);
  const short = cells.filter((line) => line.packsShort > 0);
  return (
    <section aria-label="Load" className="flex flex-col gap-3">
      {short.length > 0 && (
        <Notice kind="warn">
          {short.map((line) => `${line.designation}: ${line.packsShort} short`).join(", ")}. Fetch
          more before you leave, or mark those stops “No cells” when you get there.
        </Notice>
      )}
      <table className="w-full border-y border-rule">
        <thead>
          <tr className="text-left">
            <th className="caps py-1">Cells</th>
            <th className="caps py-1 text-right">Needed</th>
            <th className="caps py-1 text-right">In van</th>
          </tr>
        </thead>
        <tbody>
          {cells.map((line) => (
            <tr key={line.cellTypeId} className="border-t border-hair">
              <td className="py-2">
                <span className="font-semibold">{line.designation}</span>
                <span className="block text-sm text-soft">{line.forTags.join(", ")}</span>
              </td>
              <td className="py-2 text-right">{line.needed}</td>
              <td className={`py-2 text-right ${line.packsShort > 0 ? "text-brick-ink" : ""}`}>
                {line.inVan}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      {keys.length > 0 && <p>Keys: {keys.join(", ")}</p>}
      {tickets.length > 0 && (
        <p>Tickets: {tickets.map((ticket) => TICKET_WORDS[ticket] ?? ticket).join(", ")}</p>
      )}
      {!day.van && <p className="text-soft">No van is set for you: counts are not known.</p>}
    </section>
  );
}
