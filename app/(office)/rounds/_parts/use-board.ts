"use client";

import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { toast } from "@/components/ui/toast";
import type { RoundsBoard } from "@/lib/usecases/read-rounds-board";
import { ApiError, fetchJson } from "../../_parts/fetch-json";

export type PlanAct =
  | { kind: "move"; siteId: string; technicianId: string; day: string; position?: number }
  | { kind: "add"; assetId: string; technicianId: string; day: string }
  | { kind: "remove"; siteId: string }
  | { kind: "reorder"; technicianId: string; day: string; siteIds: string[] };

/** The board as it lives on the client, and what can be done to its plan. */
export function useBoard(initial: RoundsBoard, crewId: string | null) {
  const client = useQueryClient();
  const router = useRouter();
  const [trouble, setTrouble] = useState<string | null>(null);
  const planId = initial.plan?.id ?? null;
  const key = ["rounds", initial.monday, planId, crewId];
  const query = new URLSearchParams({ week: initial.monday });
  if (planId) query.set("plan", planId);
  if (crewId) query.set("crew", crewId);
  const { data: board = initial } = useQuery({
    queryKey: key,
    queryFn: () => fetchJson<RoundsBoard>(`/api/v1/rounds?${query}`),
    initialData: initial,
    refetchInterval: (q) => (q.state.data?.plan?.state === "building" ? 900 : false),
  });
  const again = () => client.invalidateQueries({ queryKey: key });
  const post = useMutation({
    mutationFn: ({ path, body }: { path: string; body: Record<string, unknown> }) =>
      fetchJson<{ planId?: string; undone?: string }>(`/api/v1/plans/${planId}/${path}`, {
        method: "POST",
        body: { ...body, version: board.plan?.version },
      }),
    onMutate: () => setTrouble(null),
    onError: (error) => {
      setTrouble(error.message);
      if (error instanceof ApiError && error.code === "conflict") void again();
    },
    onSuccess: again,
  });
  const undo = () => post.mutate({ path: "undo", body: {} });
  const act = (body: PlanAct, done: string) =>
    post.mutate(
      { path: "acts", body: { act: body } },
      { onSuccess: () => toast({ text: done, undo }) },
    );
  const lock = (siteId: string, locked: boolean) =>
    post.mutate({ path: "locks", body: { siteId, locked } });
  const improve = () => post.mutate({ path: "improve", body: {} });
  const goTo = (plan: string | null, week = initial.monday) =>
    router.push(`/rounds?week=${week}${plan ? `&plan=${plan}` : ""}`);
  const discard = useMutation({
    mutationFn: () => fetchJson(`/api/v1/plans/${planId}`, { method: "DELETE" }),
    onError: (error) => setTrouble(error.message),
    onSuccess: () => {
      router.replace(`/rounds?week=${initial.monday}`);
      router.refresh();
    },
  });
  const revise = useMutation({
    mutationFn: () =>
      fetchJson<{ planId: string }>("/api/v1/plans/revise", {
        method: "POST",
        body: { day: initial.monday > initial.today ? initial.monday : initial.today },
      }),
    onError: (error) => setTrouble(error.message),
    onSuccess: (made) => goTo(made.planId),
  });
  const busy = post.isPending || discard.isPending || revise.isPending;
  return {
    board,
    trouble,
    setTrouble,
    busy,
    act,
    lock,
    undo,
    improve,
    discard,
    revise,
    again,
    goTo,
  };
}

export type BoardActs = ReturnType<typeof useBoard>;
