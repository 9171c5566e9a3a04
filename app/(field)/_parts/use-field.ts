"use client";

import { useSyncExternalStore } from "react";
import { fieldStore } from "@/lib/offline/browser-store";
import type { FieldSnapshot } from "@/lib/offline/field-store";

const NOTHING_YET: FieldSnapshot = {
  phase: "opening",
  person: null,
  day: null,
  entries: [],
  count: { toSend: 0, refused: 0, others: 0 },
  signal: true,
  busy: false,
  signedOut: false,
};

/** What the phone keeps, as it is now. */
export function useField(): FieldSnapshot {
  return useSyncExternalStore(
    (changed) => fieldStore().subscribe(changed),
    () => fieldStore().getSnapshot(),
    () => NOTHING_YET,
  );
}
