import { formatCurrent, formatVolts } from "@/lib/present/format-quantity";
import { formatDay } from "@/lib/present/format-day";
import { packLabel } from "@/lib/present/horizon";
import { formatInstant } from "@/lib/present/format-time";
import type { AssetView } from "@/lib/usecases/read-asset";
import { plain, REASON_WORDS, STATE_WORDS } from "../../_parts/fleet-words";

export interface HistoryRow {
  readonly key: string;
  readonly at: number;
  readonly when: string;
  readonly what: string;
  readonly detail: string;
  readonly by: string;
}

type Entry = Omit<HistoryRow, "when" | "at"> & { readonly at: Date };

/** What happened to an asset, newest first: packs, measurements, events, changes, visits. */
export function historyRows(view: AssetView): HistoryRow[] {
  const entries = [...packs(view), ...draws(view), ...events(view), ...changes(view)];
  return entries
    .sort((a, b) => b.at.getTime() - a.at.getTime())
    .map((e) => ({ ...e, at: e.at.getTime(), when: formatInstant(e.at, view.organisation) }));
}

function packs({ packs: list, organisation }: AssetView): Entry[] {
  const { locale } = organisation;
  return list.flatMap((p) => {
    const label = packLabel(p.series, p.parallel, p.designation);
    const lot = p.lotCode ? `lot ${p.lotCode}` : "";
    const made = p.madeOn ? `made ${formatDay(p.madeOn, locale)}` : "";
    const put: Entry = {
      key: `${p.id}-in`,
      at: p.installedAt,
      what: `Pack in: ${label}`,
      detail: [lot, made].filter(Boolean).join(", "),
      by: p.installedBy ?? "",
    };
    if (!p.removedAt) return [put];
    const out = [
      REASON_WORDS[p.reasonOut ?? ""] ?? "",
      p.voltageOutMv === null ? "" : formatVolts(p.voltageOutMv, locale),
      p.stoppedAt ? `stopped ${formatInstant(p.stoppedAt, organisation)}` : "",
      p.lookOut,
    ];
    const taken: Entry = {
      key: `${p.id}-out`,
      at: p.removedAt,
      what: `Pack out: ${label}`,
      detail: out.filter(Boolean).join(" · "),
      by: p.removedBy ?? "",
    };
    return [put, taken];
  });
}

function draws({ draws: list, organisation: { locale } }: AssetView): Entry[] {
  return list.map((d) => ({
    key: d.id,
    at: d.at,
    what: "Draw measured",
    detail: [
      `${formatCurrent(d.averageUa, locale)} on average`,
      d.peakUa === null ? "" : `${formatCurrent(d.peakUa, locale)} at the peak`,
      d.method,
    ]
      .filter(Boolean)
      .join(", "),
    by: d.personName ?? "",
  }));
}

const EVENTS: Readonly<Record<string, string>> = {
  device_replaced: "Device replaced",
  firmware_changed: "Firmware changed",
  reported: "Device reported",
  stopped: "Device stopped",
};

function events({ events: list }: AssetView): Entry[] {
  return list.map((e) => ({
    key: e.id,
    at: e.at,
    what: EVENTS[e.kind] ?? e.kind,
    detail: e.note,
    by: e.personName ?? "",
  }));
}

/** Changes of the register itself; swaps and measurements stand above as what they are. */
function changes({ acts }: AssetView): Entry[] {
  return acts.flatMap((act): Entry[] => {
    const by = act.personName ?? act.apiKeyName ?? "";
    const detail = act.detail as Record<string, unknown>;
    const base = { key: `act-${act.id}`, at: act.at, by };
    if (act.act === "change-asset-state") {
      const [from, to] = [detail.from, detail.to].map(
        (s) => STATE_WORDS[String(s)] ?? plain(String(s)),
      );
      return [{ ...base, what: "State changed", detail: `${from} → ${to}` }];
    }
    if (act.act !== "save-asset") return [];
    return [
      { ...base, what: detail.isNew ? "Added to the register" : "Entry changed", detail: "" },
    ];
  });
}
