import type { Rng } from "../prng";
import type { World } from "../world";
import type { ScenarioAsset } from "./assets";
import type { District } from "./district";
import type { FieldLog } from "./field-log";
import type { ScenarioSite } from "./sites";
import type { ScenarioAbsence, ScenarioTechnician } from "./staff";
import type { StoreRoom } from "./store-room";

/** Everything the history is made from, handed from step to step. */
export interface Field {
  readonly world: World;
  readonly district: District;
  readonly sites: readonly ScenarioSite[];
  readonly siteByCode: ReadonlyMap<string, ScenarioSite>;
  readonly assetsAt: ReadonlyMap<string, readonly ScenarioAsset[]>;
  readonly technicians: readonly ScenarioTechnician[];
  readonly absences: readonly ScenarioAbsence[];
  readonly stores: StoreRoom;
  readonly log: FieldLog;
  readonly rng: Rng;
  /** When each asset gets its first pack, and when a retired one is taken away. */
  readonly commissionDay: ReadonlyMap<string, number>;
  readonly retireDay: ReadonlyMap<string, number>;
  /** Days between looks at a site when nothing else calls, and the next one. */
  readonly cadence: ReadonlyMap<string, number>;
  readonly nextLook: Map<string, number>;
  /** When a silence is noticed at the office. */
  readonly noticedAt: Map<string, number>;
  /** Assets the crews are to swap soon, and assets they will let be (see steer). */
  readonly swapSoon: Set<string>;
  readonly letBe: Set<string>;
  /** Assets whose silence is still waiting for a visit at the end. */
  readonly keptWaiting: Set<string>;
}

/** The pack's age in days, or null without a pack. */
export function packAge(field: Field, tag: string, day: number): number | null {
  const pack = field.log.installed.get(tag);
  return pack ? day - pack.installedAt.getTime() / 86_400_000 : null;
}
