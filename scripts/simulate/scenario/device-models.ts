import type { ScenarioModel } from "./device-model";
import { LAND_MODELS } from "./device-models-land";
import { WATER_MODELS } from "./device-models-water";

/** The twelve device models of the scenario. */
export const DEVICE_MODELS: readonly ScenarioModel[] = [...WATER_MODELS, ...LAND_MODELS];

export function modelByCode(code: string): ScenarioModel {
  const found = DEVICE_MODELS.find((model) => model.code === code);
  if (!found) throw new Error(`device models: ${code} is not one`);
  return found;
}
