"use client";

import { useQuery } from "@tanstack/react-query";
import { useEffect, useState } from "react";
import type { PlaceOption } from "@/lib/usecases/price-plan-options";
import { fetchJson } from "../../_parts/fetch-json";

/** What is being moved: a stop of the plan, or an asset that is left out. */
export interface Picked {
  readonly name: string;
  readonly siteId: string | null;
  readonly assetId: string | null;
}

export interface Options {
  readonly options: readonly PlaceOption[];
}

/** Picking a stop up: every cell of the board then shows what putting it there would do. */
export function usePlacing(planId: string | null, version: number | null) {
  const [picked, setPicked] = useState<Picked | null>(null);
  const query = new URLSearchParams();
  if (picked?.siteId) query.set("site", picked.siteId);
  if (picked?.assetId) query.set("asset", picked.assetId);
  const { data, error } = useQuery({
    queryKey: ["options", planId, version, picked?.siteId, picked?.assetId],
    queryFn: () => fetchJson<Options>(`/api/v1/plans/${planId}/options?${query}`),
    enabled: picked !== null && planId !== null,
    staleTime: 60_000,
  });
  useEffect(() => {
    if (!picked) return;
    const escape = (event: KeyboardEvent) => event.key === "Escape" && setPicked(null);
    window.addEventListener("keydown", escape);
    return () => window.removeEventListener("keydown", escape);
  }, [picked]);
  const optionAt = (technicianId: string, day: string) =>
    picked
      ? data?.options.find((o) => o.technicianId === technicianId && o.day === day)
      : undefined;
  return { picked, pick: setPicked, optionAt, trouble: picked ? (error?.message ?? null) : null };
}

export type Placing = ReturnType<typeof usePlacing>;
