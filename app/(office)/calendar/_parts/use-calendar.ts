"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { toast } from "@/components/ui/toast";
import type { CalendarEvent } from "@/lib/present/calendar-event";
import type { CalendarView } from "@/lib/usecases/read-calendar";
import { fetchJson } from "../../_parts/fetch-json";

interface Done {
  readonly planId: string;
  readonly version: number;
}

export interface Move {
  readonly event: CalendarEvent;
  readonly day: string;
  readonly technicianId: string;
}

interface Span {
  readonly from: string;
  readonly to: string;
}

/** Visits of a span of days, and moving one: published rounds are changed in a draft. */
export function useCalendar(initial: CalendarView, initialSpan: Span, span: Span) {
  const client = useQueryClient();
  const [trouble, setTrouble] = useState<string | null>(null);
  const same = span.from === initialSpan.from;
  const { data: view = initial, isFetching } = useQuery({
    queryKey: ["calendar", span.from, span.to],
    queryFn: () => fetchJson<CalendarView>(`/api/v1/calendar?from=${span.from}&to=${span.to}`),
    ...(same && { initialData: initial }),
  });
  const again = () => client.invalidateQueries({ queryKey: ["calendar"] });
  const undo = async ({ planId, version }: Done) => {
    await fetchJson(`/api/v1/plans/${planId}/undo`, { method: "POST", body: { version } }).catch(
      (error: Error) => setTrouble(error.message),
    );
    await again();
  };
  const move = useMutation({
    mutationFn: async ({ event, day, technicianId }: Move) => {
      const draft = view.drafts.find((d) => d.id === event.planId);
      const plan = draft
        ? { planId: draft.id, version: draft.version }
        : await fetchJson<Done>("/api/v1/plans/revise", {
            method: "POST",
            body: { day: event.day },
          });
      const act = { kind: "move", siteId: event.siteId, technicianId, day };
      const body = { version: plan.version, act };
      return fetchJson<Done>(`/api/v1/plans/${plan.planId}/acts`, { method: "POST", body });
    },
    onMutate: () => setTrouble(null),
    onError: (error, { event }) => setTrouble(`${event.title} stays where it is. ${error.message}`),
    onSuccess: (done, { event }) =>
      toast({
        text: `${event.title} moved in a draft. Nobody is told before you publish it.`,
        undo: () => void undo(done),
      }),
    onSettled: again,
  });
  return { view, isFetching, trouble, move };
}
