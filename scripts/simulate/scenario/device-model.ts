/** The device models of the scenario: invented, with duty cycles as a sheet would give them. */
export interface ScenarioDutyState {
  readonly name: string;
  readonly currentUa: number;
  readonly durationMs: number;
}

export type SiteKind =
  "sluice" | "culvert" | "pump_house" | "field" | "bank" | "gauge_house" | "mast";

export interface ScenarioModel {
  readonly code: string;
  readonly name: string;
  /** What an asset of it is called in the register. */
  readonly assetName: string;
  readonly cutoffMv: number;
  readonly series: number;
  readonly parallel: number;
  readonly cellTypes: readonly [string, ...string[]];
  readonly duty: readonly ScenarioDutyState[];
  readonly silenceCostMinorPerHour: number;
  readonly swapMinutes: number;
  readonly readMinutes: number;
  /** Swapped at this age whatever is left, by habit; null: no such habit for this model. */
  readonly habitIntervalDays: number | null;
  /** Swapped at a visit when a resting voltage of the pack is below this; null: no such habit. */
  readonly habitVoltageMv: number | null;
  readonly count: number;
  readonly siteKinds: readonly SiteKind[];
  /** Hidden: how much the draw follows a season, and when (share of the year) it is highest. */
  readonly season: { readonly share: number; readonly peak: number };
}

/** States as [name, mA, seconds] of one period; the first state fills what the others leave. */
export function dutyOf(
  periodS: number,
  sleepUa: number,
  busy: readonly (readonly [string, number, number])[],
): ScenarioDutyState[] {
  const used = busy.reduce((sum, [, , seconds]) => sum + seconds, 0);
  return [
    { name: "sleep", currentUa: sleepUa, durationMs: Math.round((periodS - used) * 1000) },
    ...busy.map(([name, mA, seconds]) => ({
      name,
      currentUa: Math.round(mA * 1000),
      durationMs: Math.round(seconds * 1000),
    })),
  ];
}

/** Average current of a duty cycle: the sum of current × time over the sum of time, µA. */
export function averageUa(states: readonly ScenarioDutyState[]): number {
  const time = states.reduce((sum, s) => sum + s.durationMs, 0);
  return states.reduce((sum, s) => sum + s.currentUa * s.durationMs, 0) / time;
}

export function peakUa(states: readonly ScenarioDutyState[]): number {
  return Math.max(...states.map((s) => s.currentUa));
}
