/** Stored words as people read them. */
export const STATE_WORDS: Readonly<Record<string, string>> = {
  in_service: "in service",
  stored: "stored",
  retired: "retired",
};

export const REASON_WORDS: Readonly<Record<string, string>> = {
  due: "due",
  early: "early, on the way",
  found_stopped: "found stopped",
  fault: "fault",
  device_removed: "device taken away",
  other: "another reason",
};

export const CHEMISTRY_WORDS: Readonly<Record<string, string>> = {
  alkaline: "alkaline",
  "zinc-carbon": "zinc-carbon",
  "li-fes2": "lithium iron disulphide",
  "li-socl2": "lithium thionyl chloride",
  "li-mno2": "lithium manganese dioxide",
  "silver-oxide": "silver oxide",
  vrla: "sealed lead-acid",
  lifepo4: "lithium iron phosphate",
};

/** "explosive_atmosphere" as "explosive atmosphere". */
export function plain(word: string): string {
  return word.replaceAll("_", " ");
}

export function choices(words: Readonly<Record<string, string>>) {
  return Object.entries(words).map(([value, label]) => ({ value, label }));
}
