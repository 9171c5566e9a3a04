import { isoDay, TIME_ZONE } from "../simulate/scenario/local-time";
import type { ScenarioAsset } from "../simulate/scenario/assets";
import type { Scenario } from "../simulate/scenario/scenario";
import type { ScenarioSite } from "../simulate/scenario/sites";
import { takenIn } from "./history-rows";
import { clock } from "./people-rows";
import { decimals, money, type TextTable } from "./text-table";

/** How many assets the examples hold. */
const ASSETS = 150;

const spaced = (word: string): string => word.replaceAll("_", " ");

/** Local wall time to the second, as a spreadsheet would hold it: the hour of autumn comes out as its first. */
function wall(at: Date | null): string {
  if (!at) return "";
  const parts = new Intl.DateTimeFormat("sv-SE", {
    timeZone: TIME_ZONE,
    dateStyle: "short",
    timeStyle: "medium",
  });
  return parts.format(at);
}

/** The assets of the examples: whole sites near the first one, so that they make sensible rounds. */
export function exampleAssets(s: Scenario): ScenarioAsset[] {
  const chosen: ScenarioAsset[] = [];
  const [first] = s.sites;
  const inService = s.assets.filter((a) => a.state === "in_service");
  const near = [...s.sites].sort((a, b) => squared(a, first) - squared(b, first));
  for (const site of near) {
    if (chosen.length >= ASSETS) break;
    chosen.push(...inService.filter((a) => a.siteCode === site.code));
  }
  return chosen;
}

function squared(a: ScenarioSite, b: ScenarioSite | undefined): number {
  return b ? (a.at.x - b.at.x) ** 2 + (a.at.y - b.at.y) ** 2 : 0;
}

const ASSET_HEAD = ["tag", "asset name", "device model", "state", "silence cost per hour"];

const SITE_HEAD = [
  ...["site code", "site name", "latitude", "longitude", "notice days", "opens", "closes"],
  ...["closed seasons", "key", "contact name", "contact email", "contact phone", "hazards"],
  ...["tickets needed", "drive-up notes"],
];

function siteColumns(site: ScenarioSite): string[] {
  const [opens, closes] = site.hours ?? [null, null];
  const { closure, contact } = site;
  return [
    ...[site.code, site.name, String(site.latitude), String(site.longitude)],
    ...[String(site.noticeDays), hour(opens), hour(closes)],
    ...[closure ? `${closure.first} to ${closure.last}` : "", site.keyCode ?? ""],
    ...[contact?.name ?? "", contact?.email ?? "", contact?.phone ?? ""],
    ...[site.hazards.map(spaced).join(" | "), site.tickets.map(spaced).join(" | ")],
    site.driveUpNotes,
  ];
}

function hour(minutes: number | null): string {
  return minutes === null ? "" : clock(minutes).slice(0, 5);
}

export function assetTable(s: Scenario, assets: readonly ScenarioAsset[]): TextTable {
  const sites = new Map(s.sites.map((site) => [site.code, site]));
  const models = new Map(s.models.map((m) => [m.code, m.name]));
  const rows = assets.map((a) => [
    ...[a.tag, a.name, models.get(a.modelCode) ?? "", spaced(a.state)],
    money(a.silenceCostMinorPerHour),
    ...siteColumns(sites.get(a.siteCode) as ScenarioSite),
  ]);
  return [[...ASSET_HEAD, ...SITE_HEAD], ...rows];
}

export function installTable(s: Scenario, tags: ReadonlySet<string>): TextTable {
  const head = [
    "tag",
    "installed at",
    "cell type",
    "series",
    "parallel",
    "date code",
    "lot",
    "removed at",
    "reason out",
    "voltage out V",
    "stopped at",
    "look of the cells",
  ];
  const rows = s.packs
    .filter((p) => tags.has(p.assetTag))
    .map((p) => [
      p.assetTag,
      wall(p.installedAt),
      p.designation,
      String(p.series),
      String(p.parallel),
      isoDay(p.madeDay),
      p.lotCode,
      wall(p.removedAt),
      p.reasonOut ? spaced(p.reasonOut) : "",
      p.voltageOutMv === null ? "" : decimals(p.voltageOutMv, 3),
      wall(p.stoppedAt),
      p.lookOut,
    ]);
  return [head, ...rows];
}

/** With a decimal comma, as a spreadsheet of another country would write it. */
export function readingTable(s: Scenario, tags: ReadonlySet<string>): TextTable {
  const packs = new Map(s.packs.map((p) => [p.key, p.assetTag]));
  const comma = (text: string): string => text.replace(".", ",");
  const head = [
    "tag",
    "read at",
    "volts",
    "kind",
    "load mA",
    "temperature C",
    "accuracy mV",
    "instrument",
    "note",
  ];
  const rows = takenIn(s)
    .map(({ reading }) => reading)
    .filter((r) => tags.has(packs.get(r.packKey) ?? ""))
    .map((r) => [
      packs.get(r.packKey) ?? "",
      wall(r.at),
      comma(decimals(r.millivolts, 3)),
      r.kind,
      r.loadUa === null ? "" : comma(decimals(r.loadUa, 3)),
      r.temperatureDc === null ? "" : comma(decimals(r.temperatureDc, 1)),
      r.accuracyMv === null ? "" : String(r.accuracyMv),
      r.instrument,
      r.note,
    ]);
  return [head, ...rows];
}
