import type { CannotReason } from "@/lib/sync/entries";

export const CANNOT_WORDS: Readonly<Record<CannotReason, string>> = {
  no_access: "No access",
  flooded: "Flooded",
  not_found: "Not found",
  unsafe: "Unsafe",
  no_cells: "No cells",
  other: "Another reason",
};

export const REASON_OUT_WORDS = {
  due: "It was due",
  early: "Early, while here",
  found_stopped: "Found stopped",
  fault: "Fault",
  other: "Other",
} as const;

export const LOOK_WORDS = {
  sound: "Sound",
  leaking: "Leaking",
  swollen: "Swollen",
  corroded: "Corroded",
  damaged: "Damaged",
} as const;

export const TICKET_WORDS: Readonly<Record<string, string>> = {
  height: "working at height",
  boat: "boat",
  confined_space: "confined space",
  roadside: "roadside",
  explosive_atmosphere: "explosive atmosphere",
};

export const TASK_WORDS = { swap: "swap", read: "read", inspect: "inspect" } as const;

export interface CautionWords {
  readonly title: string;
  readonly text: string;
}

const LITHIUM: CautionWords = {
  title: "Lithium cell",
  text: "Do not short, heat, force or charge. Tape both terminals of the old cell before it goes in the return box.",
};

/** What can hurt when cells of a chemistry are handled. Common practice, short. */
const CHEMISTRY_CAUTIONS: Readonly<Record<string, CautionWords>> = {
  alkaline: {
    title: "Alkaline cell",
    text: "A leaking cell is caustic: gloves on, keep it off skin and eyes, rinse with water. Do not charge or short.",
  },
  "zinc-carbon": {
    title: "Zinc-carbon cell",
    text: "A leaking cell is corrosive: gloves on, keep it off skin and eyes. Do not charge or short.",
  },
  "li-fes2": LITHIUM,
  "li-mno2": LITHIUM,
  "li-socl2": {
    title: "Lithium-thionyl cell",
    text: "Do not short, heat, force or charge. A damaged cell gives off choking gas: step back, upwind. Tape both terminals before the return box.",
  },
  "silver-oxide": {
    title: "Button cell",
    text: "Dangerous if swallowed: never leave one lying about. Do not short.",
  },
  vrla: {
    title: "Lead-acid block",
    text: "Heavy, and a short melts tools: cover the terminals, take off rings, lift with care. Keep sparks away.",
  },
  lifepo4: {
    title: "Lithium iron phosphate pack",
    text: "A short gives very high current: cover the terminals, take off rings. Do not open or crush.",
  },
};

export function chemistryCaution(chemistry: string | undefined): CautionWords | null {
  return CHEMISTRY_CAUTIONS[chemistry ?? ""] ?? null;
}

/** What can hurt at a place. Common practice, short. */
export const HAZARD_CAUTIONS: Readonly<Record<string, CautionWords>> = {
  water: { title: "Open water", text: "Lifejacket on; keep off wet edges when alone." },
  height: { title: "Height", text: "Clip on before you climb; nobody below." },
  confined_space: {
    title: "Confined space",
    text: "Do not go in without a permit, a gas test and a second person.",
  },
  roadside: { title: "Roadside", text: "High-visibility clothing; park and work facing traffic." },
  explosive_atmosphere: {
    title: "Explosive atmosphere",
    text: "No phone, meter or tool here that is not certified for the zone. Swap outside it.",
  },
  lone_working: { title: "Lone working", text: "Tell the office when you arrive and leave." },
  livestock: { title: "Livestock", text: "Close gates; keep clear of animals with young." },
  soft_ground: { title: "Soft ground", text: "Park on hard standing; test the bank with a stick." },
};
