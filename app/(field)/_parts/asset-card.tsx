import { WaneDisc } from "@/components/charts/wane-disc";
import { BigButton } from "@/components/ui/big-button";
import { Caution } from "@/components/ui/notice";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatDay, formatWindow } from "@/lib/present/format-day";
import { formatVolts } from "@/lib/present/format-quantity";
import type { DayAsset, DayPack, DayTask } from "@/lib/sync/day-pack";
import { discOf, isFresh } from "./day-view";
import { chemistryCaution } from "./field-words";

const MS_PER_DAY = 86_400_000;

export interface AssetCardProps {
  day: DayPack;
  asset: DayAsset;
  task?: DayTask;
  stopId?: string;
  heading?: "h1" | "h2";
}

/** An asset at a stop: what is in it, how long it lasts, what to do. */
export function AssetCard({ day, asset, task, stopId, heading: Heading = "h2" }: AssetCardProps) {
  const { pack } = asset;
  const cellId = task?.cellTypeId ?? pack?.cellTypeId;
  const cell = day.cellTypes.find((candidate) => candidate.id === cellId);
  const old = day.cellTypes.find((candidate) => candidate.id === pack?.cellTypeId);
  const caution = chemistryCaution((old ?? cell)?.spec.chemistry);
  const at = `asset=${asset.id}${stopId ? `&stop=${stopId}` : ""}`;
  const done = task?.state === "done";
  return (
    <section aria-label={asset.name} className="flex flex-col gap-3 border-t border-rule pt-3">
      <div>
        <p className="font-mono text-sm font-semibold">{asset.tag}</p>
        <Heading className={Heading === "h1" ? "text-3xl" : "text-xl"}>{asset.name}</Heading>
      </div>
      <PackLine day={day} asset={asset} />
      {task && cell && (
        <p className="font-semibold">
          {task.cells} × {cell.designation}
          {done && " · done"}
        </p>
      )}
      <LastReadings day={day} asset={asset} />
      {asset.note && <p className="text-soft">{asset.note}</p>}
      {caution && <Caution title={caution.title}>{caution.text}</Caution>}
      <div className="flex flex-col gap-2.5">
        <BigButton kind={task?.kind === "swap" && !done ? "go" : "plain"} href={`/swap?${at}`}>
          {pack ? "Swap the pack" : "Put a pack in"}
        </BigButton>
        {pack && (
          <BigButton
            kind={task && task.kind !== "swap" && !done ? "go" : "plain"}
            href={`/log?${at}`}
          >
            {task?.kind === "swap" ? "Log a voltage only" : "Log a voltage"}
          </BigButton>
        )}
      </div>
    </section>
  );
}

function PackLine({ day, asset }: { day: DayPack; asset: DayAsset }) {
  if (!asset.pack) return <p className="text-soft">No pack is known to be in it.</p>;
  const disc = discOf(day, asset);
  return (
    <div className="flex items-center gap-3">
      <WaneDisc model={disc} size={40} decorative />
      <p>
        <span className="block font-semibold">
          {disc.label}
          {asset.pack.forecast && disc.state === "lit" && " left"}
        </span>
        <span className="block text-soft">{cutoffWords(day, asset)}</span>
      </p>
    </div>
  );
}

/** When it stops, or since when it has stood still. */
function cutoffWords(day: DayPack, asset: DayAsset): string {
  const { locale, timeZone } = day.organisation;
  const today = dayOfInstant(new Date(day.madeAt), timeZone);
  const dayOf = (at: Date) => dayOfInstant(at, timeZone);
  const stopped = asset.pack?.events.find((event) => event.kind === "stopped");
  if (stopped) {
    const since = dayOf(new Date(stopped.atDay * MS_PER_DAY));
    return `stopped ${formatDay(since, locale, { weekday: true, today })}`;
  }
  const forecast = asset.pack?.forecast;
  if (!forecast) {
    return isFresh(day, asset.pack)
      ? "fresh: its forecast comes when it has been sent"
      : "no forecast yet: a voltage says more";
  }
  const [p5, p50, p95] = [forecast.p05, forecast.p50, forecast.p95].map((at) => new Date(at));
  if (!p5 || !p50 || !p95) return "";
  const window = formatWindow({ p5: dayOf(p5), p50: dayOf(p50), p95: dayOf(p95) }, locale, today);
  return `cut-off ${window.text}`;
}

function LastReadings({ day, asset }: { day: DayPack; asset: DayAsset }) {
  const { locale, timeZone } = day.organisation;
  const today = dayOfInstant(new Date(day.madeAt), timeZone);
  const last = (asset.pack?.readings ?? []).slice(-3).reverse();
  if (last.length === 0) return null;
  return (
    <ul aria-label="Last voltages" className="text-soft">
      {last.map((reading) => (
        <li key={reading.id}>
          {formatVolts(reading.millivolts, locale)}{" "}
          {reading.kind === "loaded" ? "under load" : "resting"},{" "}
          {formatDay(dayOfInstant(new Date(reading.atDay * MS_PER_DAY), timeZone), locale, {
            today,
          })}
        </li>
      ))}
    </ul>
  );
}
