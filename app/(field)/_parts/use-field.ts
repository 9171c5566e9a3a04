"use client";

import { useSyncExternalStore } from "react";
import { fieldStore } from "@/lib/offline/browser-store";
import { type FieldSnapshot, NOTHING_YET } from "@/lib/offline/field-store";

/** What the phone keeps, as it is now. */
export function useField(): FieldSnapshot {
  return useSyncExternalStore(
    (changed) => fieldStore().subscribe(changed),
    () => fieldStore().getSnapshot(),
    () => NOTHING_YET,
  );
}
