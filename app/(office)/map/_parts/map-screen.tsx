"use client";

import { useQuery } from "@tanstack/react-query";
import { useMemo, useState } from "react";
import { DistrictMap } from "@/components/map/district-map";
import { ChipLink, FilterBar } from "@/components/ui/chip-link";
import type { MapView } from "@/lib/usecases/read-map";
import { fetchJson } from "../../_parts/fetch-json";
import { PackList } from "./pack-list";
import { RoundChoice } from "./round-choice";

const FILTERS = [
  { within: "0", words: "Past likely cut-off" },
  { within: "30", words: "Likely out in 30 days" },
  { within: "90", words: "in 90 days" },
  { within: "all", words: "All packs" },
];

/** Packs by when they are due, and the week's rounds, on the ground. */
export function MapScreen({ initial }: { initial: MapView }) {
  const { data: view = initial } = useQuery({
    queryKey: ["map", initial.within, initial.monday],
    queryFn: () =>
      fetchJson<MapView>(`/api/v1/map?within=${initial.within}&week=${initial.monday}`),
    initialData: initial,
  });
  const [chosen, choose] = useState<string | null>(null);
  const [round, chooseRound] = useState<string | null>(null);
  const discs = useMemo(
    () =>
      view.packs.map((pack) => ({
        id: pack.assetId,
        label: `${pack.tag}, ${pack.disc.title}, ${pack.window}`,
        disc: pack.disc,
        latitude: pack.latitude,
        longitude: pack.longitude,
      })),
    [view.packs],
  );
  const rounds = useMemo(
    () =>
      view.rounds.map((r) => ({
        id: r.roundId,
        label: r.title,
        depot: r.depot,
        stops: r.stops.map((s) => ({ ...s, id: s.siteId, label: s.siteName })),
      })),
    [view.rounds],
  );
  return (
    <>
      <FilterBar summary={`${view.packs.length} packs, ${view.rounds.length} rounds this week`}>
        {FILTERS.map(({ within, words }) => (
          <ChipLink
            key={within}
            href={`/map?within=${within}&week=${view.monday}`}
            active={view.within === within}
          >
            {words}
          </ChipLink>
        ))}
      </FilterBar>
      <div className="grid gap-4 lg:grid-cols-[minmax(0,1fr)_24rem]">
        <DistrictMap
          label="Map of the district; the packs and rounds are listed beside it"
          className="h-[26rem] lg:h-[calc(100vh-12rem)] min-h-100 border border-rule"
          discs={discs}
          rounds={rounds}
          chosenRound={round}
          chosenDisc={chosen}
          tileUrl={view.tileUrl}
          onSelect={choose}
          onRound={chooseRound}
        />
        <div className="flex min-w-0 flex-col">
          <RoundChoice rounds={view.rounds} chosen={round} onChoose={chooseRound} />
          <PackList packs={view.packs} chosen={chosen} onChoose={choose} />
        </div>
      </div>
    </>
  );
}
