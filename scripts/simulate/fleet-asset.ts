import { type CellString, cloneString, isSpent, spendString, stringVolts } from "./cell-string";
import { dailyDrawMa, type DeviceConfig, type DeviceTruth, drawDevice, peakMa } from "./device";
import type { Rng } from "./prng";
import type { Weather } from "./weather";

export interface WorldAsset extends DeviceConfig {
  readonly key: string;
}

/** One device, its pack, and how far its time has run. */
export interface AssetState {
  readonly config: WorldAsset;
  readonly device: DeviceTruth;
  readonly drawRng: Rng;
  readonly meterRng: Rng;
  readonly cellRng: Rng;
  pack: CellString | null;
  cursor: number;
  stoppedAt: number | null;
  averageMa: number;
}

/** A device without a pack, with hidden parameters drawn from its own generator. */
export function createAsset(config: WorldAsset, rng: Rng, day: number): AssetState {
  return {
    config,
    device: drawDevice(config, rng.fork("device")),
    drawRng: rng.fork("draw"),
    meterRng: rng.fork("meter"),
    cellRng: rng.fork("cells"),
    pack: null,
    cursor: day,
    stoppedAt: null,
    averageMa: config.averageUa / 1000,
  };
}

/** True when the device's peak pulls the pack below its cut-off in the coldest hour of the day. */
function stops(state: AssetState, pack: CellString, weather: Weather, day: number): boolean {
  if (isSpent(pack)) return true;
  const cold = weather.minC(day) + state.config.exposureC;
  const volts = stringVolts(pack, peakMa(state.config, state.device), cold, day);
  return volts * 1000 < state.device.cutoffMv;
}

/** Lets time pass for one device, day by day; a stop is for good until the cells are changed. */
export function advance(state: AssetState, weather: Weather, toDay: number): void {
  const { pack } = state;
  while (state.cursor < toDay) {
    const day = Math.floor(state.cursor);
    const until = Math.min(day + 1, toDay);
    state.averageMa = dailyDrawMa(state.config, state.device, day, state.drawRng);
    if (pack) {
      const running = state.stoppedAt === null ? state.averageMa : 0;
      const celsius = weather.meanC(day) + state.config.exposureC;
      spendString(pack, running, (until - state.cursor) * 24, celsius);
      if (state.stoppedAt === null && stops(state, pack, weather, day)) {
        state.stoppedAt = state.cursor + (until - state.cursor) * 0.9;
      }
    }
    state.cursor = until;
  }
}

/** A copy that can be run ahead without touching the original. */
export function twin(state: AssetState): AssetState {
  return {
    ...state,
    device: { ...state.device },
    drawRng: state.drawRng.clone(),
    meterRng: state.meterRng.clone(),
    cellRng: state.cellRng.clone(),
    pack: state.pack ? cloneString(state.pack) : null,
  };
}

/** How long the film has had to grow: since the device stopped, or in a long sleep, or since install. */
export function restedDays(state: AssetState, at: number): number {
  if (state.stoppedAt !== null) return at - state.stoppedAt;
  const sleepy = state.config.averageUa < 100 ? 6 : 0.5;
  return Math.min(sleepy, at - (state.pack?.installedAt ?? at));
}
