import type { SelectOption } from "@/components/ui/select";
import type { Presentation } from "@/lib/present/locale";
import type { ActContext } from "./act-context";

/** What the question "what if" needs to know; plain data, as it goes to the browser. */
export interface WhatIfProps {
  /** null for those who may look and not record. */
  context: ActContext | null;
  subject: { readonly tag: string; readonly installedAt: Date };
  today: string;
  presentation: Presentation;
  /** Where the duty cycle and the preferred cells are changed; null: not by this person. */
  modelHref: string | null;
  periodMinutes: string;
  states: readonly SelectOption[];
  otherCells: readonly SelectOption[];
}
