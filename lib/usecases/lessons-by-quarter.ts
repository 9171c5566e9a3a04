import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { fleetPriorsBefore, type PriorOf } from "./fleet-priors";
import type { ForecastCatalogue } from "./forecast-input";
import { quarterAround } from "./quarters";

/** What the fleet had taught at the start of the quarter in which a moment lies. */
export type LessonAt = (at: Date) => Promise<PriorOf>;

/** What past forecasts are worked out from. */
export interface JudgingGround {
  readonly catalogue: ForecastCatalogue;
  readonly lessonAt: LessonAt;
  readonly timeZone: string;
}

/** Lessons of the past, each learned once and only when it is asked for. */
export function lessonsByQuarter(
  db: Kysely<Database>,
  catalogue: ForecastCatalogue,
  timeZone: string,
): LessonAt {
  const learned = new Map<string, Promise<PriorOf>>();
  return (at) => {
    const quarter = quarterAround(at, timeZone);
    const lesson = learned.get(quarter.day) ?? fleetPriorsBefore(db, catalogue, quarter.at);
    learned.set(quarter.day, lesson);
    return lesson;
  };
}
