import { CELL_TYPE_FIELDS, DEVICE_MODEL_FIELDS } from "./catalogue-fields";
import type { FieldSpec } from "./field-spec";
import { ASSET_FIELDS } from "./asset-fields";
import { INSTALL_FIELDS, READING_FIELDS } from "./service-fields";

export const IMPORT_KINDS = [
  "cell_types",
  "device_models",
  "assets",
  "installs",
  "readings",
] as const;
export type ImportKind = (typeof IMPORT_KINDS)[number];

/** What a file of each kind may say. The order is that of the mapping screen and of exports. */
export const IMPORT_FIELDS: Readonly<Record<ImportKind, readonly FieldSpec[]>> = {
  cell_types: CELL_TYPE_FIELDS,
  device_models: DEVICE_MODEL_FIELDS,
  assets: ASSET_FIELDS,
  installs: INSTALL_FIELDS,
  readings: READING_FIELDS,
};
