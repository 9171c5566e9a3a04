import type { DayAsset, DayPack, DayTask } from "@/lib/sync/day-pack";
import type { OutboxEntry } from "@/lib/sync/outbox";

/** The swap that is being entered: where, for which task, and what it mends. */
export interface SwapFormProps {
  day: DayPack;
  asset: DayAsset;
  stopId: string | null;
  task: DayTask | undefined;
  back: { href: string; label: string };
  /** The refused swap that this one mends. */
  mended: OutboxEntry | null;
}
