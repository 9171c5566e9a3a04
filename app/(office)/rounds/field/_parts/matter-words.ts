import { formatDay } from "@/lib/present/format-day";
import { formatVolts } from "@/lib/present/format-quantity";
import type { FieldMatter, FieldMatters } from "@/lib/usecases/list-field-matters";

/** What stands in a matter's heading and beneath it. */
export interface MatterWords {
  readonly kind: string;
  readonly title: string;
  /** What the phone said. */
  readonly said: string;
  /** Why it needs a decision. */
  readonly why: string;
}

const KINDS: Readonly<Record<string, string>> = {
  refused: "Refused",
  conflict: "Conflict",
  shortage: "Short at the load check",
  cannot: "Could not be done",
};

const REASONS: Readonly<Record<string, string>> = {
  no_access: "no access",
  flooded: "flooded",
  not_found: "not found",
  unsafe: "unsafe",
  no_cells: "no cells",
  other: "another reason",
};

export const OUTCOMES: Readonly<Record<string, string>> = {
  sent_again: "sent again",
  mended: "mended on the phone",
  planned_again: "left to the next plan",
  closed: "closed",
};

interface Told {
  readonly kind?: string;
  readonly mode?: string;
  readonly millivolts?: number;
  readonly reason?: string;
  readonly note?: string;
  readonly text?: string;
  readonly act?: string;
  readonly voltageOutMv?: number | null;
  readonly lines?: readonly {
    readonly cellTypeId: string;
    readonly needed: number;
    readonly found: number;
    readonly packsShort: number;
  }[];
  readonly stopsShort?: number;
}

/** A matter in words. */
export function matterWords(matter: FieldMatter, view: FieldMatters): MatterWords {
  const { locale } = view.organisation;
  const body = (matter.body ?? {}) as Told;
  const round = matter.day ? `Round of ${formatDay(matter.day, locale, { weekday: true })}` : "";
  const asset = matter.tag ? `${matter.tag} ${matter.assetName}` : "";
  const site = matter.siteName ? `${matter.siteCode} ${matter.siteName}` : "";
  return {
    kind: KINDS[matter.kind] ?? matter.kind,
    title: asset || site || round || "An entry that names nothing we know",
    said: saidWords(matter, body, view),
    why: whyWords(matter, locale),
  };
}

function saidWords(matter: FieldMatter, body: Told, view: FieldMatters): string {
  const { locale } = view.organisation;
  if (matter.kind === "shortage") return shortWords(matter.detail as Told, view);
  const note = body.note ? ` “${body.note}”` : "";
  switch (body.kind) {
    case "reading":
      return `${volts(body.millivolts, locale)} ${body.mode === "loaded" ? "under load" : "resting"}.${note}`;
    case "swap":
      return `Pack swapped, ${volts(body.voltageOutMv, locale)} out.${note}`;
    case "cannot":
      return `Not done: ${REASONS[body.reason ?? ""] ?? body.reason}.${note}`;
    case "stop-done":
      return "Stop done.";
    case "note":
      return body.text ? `“${body.text}”` : "Photos.";
    case "round":
      return body.act === "done" ? "Round finished." : "Round started.";
    case "reorder":
      return "The stops in another order.";
    default:
      return "An entry that could not be read.";
  }
}

function shortWords({ lines = [], stopsShort = 0, note }: Told, view: FieldMatters): string {
  const cells = lines.map((line) => {
    const name = view.cellNames.get(line.cellTypeId) ?? "cells";
    return `${name}: ${line.found} of ${line.needed} in the van, ${line.packsShort} ${line.packsShort === 1 ? "pack" : "packs"} short`;
  });
  const stops = `${stopsShort} ${stopsShort === 1 ? "stop" : "stops"} cannot be done`;
  return `${[...cells, stops].join("; ")}.${note ? ` “${note}”` : ""}`;
}

function volts(millivolts: number | null | undefined, locale: string): string {
  return typeof millivolts === "number" ? formatVolts(millivolts, locale) : "no voltage";
}

function whyWords(matter: FieldMatter, locale: string): string {
  const refusal = matter.refusal as { readonly message?: string } | null;
  if (matter.kind === "refused" || matter.kind === "conflict") return refusal?.message ?? "";
  if (matter.kind === "cannot") {
    return matter.returnOn
      ? `Proposes to come back on ${formatDay(matter.returnOn, locale, { weekday: true })}.`
      : "No day to come back is proposed.";
  }
  return "";
}
