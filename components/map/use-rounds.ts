"use client";

import type L from "leaflet";
import { type RefObject, useEffect, useRef } from "react";
import { type MapRound, roundLine, type StopMark, stopMarks } from "./map-layers";

export interface RoundMarks {
  readonly rounds: readonly MapRound[];
  /** The round drawn with its numbers. */
  readonly chosenRound?: string | null | undefined;
  /** The stop that stands out. */
  readonly chosenStop?: string | null | undefined;
  readonly onRound?: ((roundId: string) => void) | undefined;
  readonly onStop?: ((stopId: string, roundId: string) => void) | undefined;
}

const nobody = () => undefined;

/** Draws rounds and their stops on a map, and brings the chosen stop into sight. */
export function useRounds(map: RefObject<L.Map | null>, shown: RoundMarks): void {
  const { rounds, chosenRound, chosenStop, onRound = nobody, onStop = nobody } = shown;

  useEffect(() => {
    const on = map.current;
    if (!on) return;
    const lines = rounds.map((r) => roundLine(r, r.id === chosenRound, onRound).addTo(on));
    return () => lines.forEach((line) => void line.remove());
  }, [map, rounds, chosenRound, onRound]);

  const marks = useRef<readonly StopMark[]>([]);
  useEffect(() => {
    const on = map.current;
    if (!on) return;
    const made = rounds.flatMap((r) => stopMarks(r, r.id === chosenRound, onStop));
    made.forEach(({ marker }) => void marker.addTo(on));
    marks.current = made;
    return () => made.forEach(({ marker }) => void marker.remove());
  }, [map, rounds, chosenRound, onStop]);

  useEffect(() => {
    for (const { id, light } of marks.current) light(id === chosenStop);
  }, [rounds, chosenRound, chosenStop, onStop]);

  useEffect(() => {
    const stop = rounds.flatMap((r) => r.stops).find(({ id }) => id === chosenStop);
    if (stop) map.current?.panInside([stop.latitude, stop.longitude], { padding: [32, 32] });
  }, [map, rounds, chosenStop]);
}
