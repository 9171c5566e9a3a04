"use client";

import { useQuery } from "@tanstack/react-query";
import { useState } from "react";
import { Button, LinkButton } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Notice } from "@/components/ui/notice";
import { Skeleton } from "@/components/ui/states";
import type { CalendarEvent } from "@/lib/present/calendar-event";
import type { PlaceOption } from "@/lib/usecases/price-plan-options";
import { fetchJson } from "../../_parts/fetch-json";

export interface MoveDialogProps {
  event: CalendarEvent;
  mayEdit: boolean;
  onClose: () => void;
  onMove: (day: string, technicianId: string) => void;
}

/** One visit, and every place it could go to with its price: moving without a mouse. */
export function MoveDialog({ event, mayEdit, onClose, onMove }: MoveDialogProps) {
  const [to, setTo] = useState<PlaceOption | null>(null);
  const { data, error } = useQuery({
    queryKey: ["options", event.planId, event.siteId],
    queryFn: () =>
      fetchJson<{ options: PlaceOption[] }>(
        `/api/v1/plans/${event.planId}/options?site=${event.siteId}`,
      ),
    enabled: mayEdit,
    staleTime: 0,
  });
  return (
    <Dialog
      open
      title={event.title}
      onClose={onClose}
      actions={
        <>
          <LinkButton href={`/rounds?round=${event.roundId}`}>Open its round</LinkButton>
          {mayEdit && (
            <Button kind="go" disabled={!to} onClick={() => to && onMove(to.day, to.technicianId)}>
              Move it
            </Button>
          )}
        </>
      }
    >
      <p className="mb-3">{event.label}</p>
      {error && <Notice kind="trouble">{error.message}</Notice>}
      {mayEdit && !data && !error && <Skeleton label="Pricing the places" rows={5} shape="lines" />}
      {data && <Places options={data.options} chosen={to} onChoose={setTo} />}
      {!mayEdit && <p className="text-soft">This visit cannot be moved from here.</p>}
    </Dialog>
  );
}

interface PlacesProps {
  options: readonly PlaceOption[];
  chosen: PlaceOption | null;
  onChoose: (option: PlaceOption) => void;
}

function Places({ options, chosen, onChoose }: PlacesProps) {
  const sorted = [...options].sort(
    (a, b) => a.day.localeCompare(b.day) || a.technician.localeCompare(b.technician),
  );
  return (
    <fieldset>
      <legend className="caps mb-1">Where it could go</legend>
      <ul className="max-h-80 overflow-y-auto border-y border-rule">
        {sorted.map((option) => (
          <li
            key={`${option.technicianId} ${option.day}`}
            className="border-t border-hair first:border-t-0"
          >
            <label className="grid grid-cols-[1.25rem_minmax(0,12rem)_4rem_minmax(0,1fr)] items-baseline gap-2 py-1">
              <input
                type="radio"
                name="place"
                disabled={!option.allowed || option.here}
                checked={chosen === option}
                onChange={() => onChoose(option)}
              />
              <span className={option.allowed ? "" : "text-soft"}>
                {option.dayLabel}, {option.technician}
              </span>
              <span className="font-semibold">{option.here ? "here" : option.short}</span>
              <span className="text-sm text-soft">{option.here ? "" : option.words}</span>
            </label>
          </li>
        ))}
      </ul>
    </fieldset>
  );
}
