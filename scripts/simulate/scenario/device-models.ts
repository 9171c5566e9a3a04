import type { ScenarioModel } from "./device-model";
import { LAND_MODELS } from "./device-models-land";
import { WATER_MODELS } from "./device-models-water";

/** The twelve device models of the scenario. */
export const DEVICE_MODELS: readonly ScenarioModel[] = [...WATER_MODELS, ...LAND_MODELS];

const BY_CODE = new Map(DEVICE_MODELS.map((model) => [model.code, model]));

export function modelByCode(code: string): ScenarioModel {
  const found = BY_CODE.get(code);
  if (!found) throw new Error(`device models: ${code} is not one`);
  return found;
}
