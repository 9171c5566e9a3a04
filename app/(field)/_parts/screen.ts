import type { FieldSnapshot } from "@/lib/offline/field-store";
import type { DayPack } from "@/lib/sync/day-pack";

/** What every screen with a day is given. */
export interface ScreenProps {
  readonly field: FieldSnapshot;
  readonly day: DayPack;
  /** The address's query. */
  readonly query: { get(name: string): string | null };
}
