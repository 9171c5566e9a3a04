import { formatDay } from "@/lib/present/format-day";
import type { TechnicianView } from "@/lib/usecases/read-technician";
import { ConfirmRemoval } from "../../../_parts/confirm-removal";
import { removeAbsenceAction } from "../actions";
import { AbsenceForm } from "./absence-form";

/** Absences to come and past, newest first, with the form for another. */
export function AbsenceList({ view, mayChange }: { view: TechnicianView; mayChange: boolean }) {
  const { technician, organisation, today } = view;
  const day = (iso: string) => formatDay(iso, organisation.locale, { weekday: true, year: true });
  return (
    <div>
      {technician.absences.length === 0 && (
        <p className="px-3 py-3 text-soft">No absence recorded.</p>
      )}
      <ul className="divide-y divide-hair">
        {technician.absences.map((absence) => {
          const words =
            absence.firstDay === absence.lastDay
              ? day(absence.firstDay)
              : `${day(absence.firstDay)} – ${day(absence.lastDay)}`;
          return (
            <li key={absence.id} className="flex items-center gap-x-4 px-3 py-1.5">
              <div className="flex min-w-0 flex-1 flex-wrap gap-x-4">
                <span className={absence.lastDay < today ? "text-soft" : "font-medium"}>
                  {words}
                </span>
                <span className="text-soft">{absence.reason}</span>
              </div>
              {mayChange && (
                <ConfirmRemoval
                  id={absence.id}
                  called={`the absence ${words}`}
                  loses={`${technician.name} can be planned on these days again.`}
                  action={removeAbsenceAction}
                />
              )}
            </li>
          );
        })}
      </ul>
      {mayChange && <AbsenceForm technicianId={technician.id} today={today} />}
    </div>
  );
}
