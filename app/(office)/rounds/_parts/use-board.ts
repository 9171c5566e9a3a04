"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useEffect, useRef, useState } from "react";
import { toast } from "@/components/ui/toast";
import type { RoundsBoard } from "@/lib/usecases/read-rounds-board";
import { ApiError, fetchJson } from "../../_parts/fetch-json";

export type PlanAct =
  | { kind: "move"; siteId: string; technicianId: string; day: string; position?: number }
  | { kind: "add"; assetId: string; technicianId: string; day: string }
  | { kind: "remove"; siteId: string }
  | { kind: "reorder"; technicianId: string; day: string; siteIds: string[] };

/** Where the board of a week, a plan and a crew is read, and what it is remembered under. */
function boardQuery(initial: RoundsBoard, crewId: string | null) {
  const planId = initial.plan?.id ?? null;
  const query = new URLSearchParams({ week: initial.monday });
  if (planId) query.set("plan", planId);
  if (crewId) query.set("crew", crewId);
  return {
    queryKey: ["rounds", initial.monday, planId, crewId],
    queryFn: () => fetchJson<RoundsBoard>(`/api/v1/rounds?${query}`),
    initialData: initial,
  };
}

/** The board as it lives on the client, and what can be done to its plan. */
export function useBoard(initial: RoundsBoard, crewId: string | null) {
  const client = useQueryClient();
  const [trouble, setTrouble] = useState<string | null>(null);
  const read = boardQuery(initial, crewId);
  const { data: board } = useQuery({
    ...read,
    refetchInterval: (q) => (q.state.data?.plan?.state === "building" ? 900 : false),
  });
  const again = () => client.invalidateQueries({ queryKey: read.queryKey });
  const edits = useEdits(board, again, setTrouble);
  const plans = usePlanChoice(initial, setTrouble);
  return { board, trouble, again, ...edits, ...plans, busy: edits.busy || plans.choosing };
}

type SetTrouble = (trouble: string | null) => void;

/** Acts on the plan that is shown. */
function useEdits(board: RoundsBoard, again: () => Promise<void>, setTrouble: SetTrouble) {
  const { plan } = board;
  const post = useMutation({
    mutationFn: ({ path, body }: { path: string; body: Record<string, unknown> }) =>
      fetchJson(`/api/v1/plans/${plan?.id}/${path}`, {
        method: "POST",
        body: { ...body, version: plan?.version },
      }),
    onMutate: () => setTrouble(null),
    onError: (error) => {
      setTrouble(error.message);
      if (error instanceof ApiError && error.code === "conflict") void again();
    },
    onSuccess: again,
  });
  // A toast outlives the render that made it: the version to undo is the one that stands then.
  const { mutate } = post;
  const latest = useRef(mutate);
  useEffect(() => {
    latest.current = mutate;
  }, [mutate]);
  const undo = () => latest.current({ path: "undo", body: {} });
  return {
    busy: post.isPending,
    undo,
    act: (act: PlanAct, done: string) =>
      mutate({ path: "acts", body: { act } }, { onSuccess: () => toast({ text: done, undo }) }),
    lock: (siteId: string, locked: boolean) => mutate({ path: "locks", body: { siteId, locked } }),
    improve: () => mutate({ path: "improve", body: {} }),
    stop: () => mutate({ path: "stop", body: {} }),
  };
}

/** Going to another plan of the week: discarding this one, or revising what is published. */
function usePlanChoice(initial: RoundsBoard, setTrouble: SetTrouble) {
  const router = useRouter();
  const { monday, today, plan } = initial;
  const onError = (error: Error) => setTrouble(error.message);
  const goTo = (planId: string, week = monday) =>
    router.push(`/rounds?week=${week}&plan=${planId}`);
  const discard = useMutation({
    mutationFn: () => fetchJson(`/api/v1/plans/${plan?.id}`, { method: "DELETE" }),
    onError,
    onSuccess: () => {
      router.replace(`/rounds?week=${monday}`);
      router.refresh();
    },
  });
  const revise = useMutation({
    mutationFn: () =>
      fetchJson<{ planId: string }>("/api/v1/plans/revise", {
        method: "POST",
        body: { day: monday > today ? monday : today },
      }),
    onError,
    onSuccess: (made) => goTo(made.planId),
  });
  return { goTo, discard, revise, choosing: discard.isPending || revise.isPending };
}

export type BoardActs = ReturnType<typeof useBoard>;
