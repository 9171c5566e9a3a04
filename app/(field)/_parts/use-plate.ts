"use client";

import { useDeferredValue, useMemo, useState } from "react";
import { expectedBand, inputFor, type MeasuredVoltage, readPlate } from "@/lib/offline/plate";
import { voltagePlate, type VoltagePlateModel } from "@/lib/present/voltage-plate";
import type { DayAsset, DayPack } from "@/lib/sync/day-pack";
import { type PlateWords, plateWords } from "./plate-words";

const MS_PER_DAY = 86_400_000;

export interface Plate {
  readonly model: VoltagePlateModel;
  readonly words: PlateWords | null;
}

export interface Typed extends Omit<MeasuredVoltage, "millivolts"> {
  readonly millivolts: number | null;
}

/**
 * The voltage plate of what is being typed: what was expected, what the reading means and how
 * the window moves, all computed here. Typing never waits for it.
 */
export function usePlate(day: DayPack, asset: DayAsset, typed: Typed): Plate | null {
  const [openedAt] = useState(() => new Date());
  const { millivolts, kind, loadUa, temperatureDc } = useDeferredValue(typed);
  const input = useMemo(
    () => inputFor(day, asset, openedAt.getTime() / MS_PER_DAY),
    [day, asset, openedAt],
  );
  return useMemo(() => {
    if (!input) return null;
    const query = { kind, loadUa, temperatureDc };
    const { locale, timeZone } = day.organisation;
    const { cutoffMv } = input.pack;
    const reading = millivolts === null ? null : readPlate(input, { millivolts, ...query });
    const expected = reading?.expected ?? expectedBand(input, query);
    const model = voltagePlate({ readingMv: millivolts, expected, cutoffMv, locale });
    const words =
      reading && millivolts !== null
        ? plateWords(reading, model.verdict, { locale, timeZone, now: openedAt })
        : null;
    return { model, words };
  }, [input, day.organisation, millivolts, kind, loadUa, temperatureDc, openedAt]);
}
