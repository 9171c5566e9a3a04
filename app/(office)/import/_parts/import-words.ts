export const KIND_WORDS: Readonly<Record<string, string>> = {
  cell_types: "cell types",
  device_models: "device models",
  assets: "assets with their sites",
  installs: "installs",
  readings: "readings",
};

export const STATE_WORDS: Readonly<Record<string, string>> = {
  uploaded: "columns to choose",
  checking: "being looked at",
  checked: "ready to import",
  importing: "being imported",
  imported: "imported",
  failed: "could not be read",
};
