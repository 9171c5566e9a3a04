import Link from "next/link";
import { Section } from "@/components/ui/page-head";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { findingWords } from "@/lib/present/finding-words";
import { formatDay } from "@/lib/present/format-day";
import { formatNumber } from "@/lib/present/locale";
import type { FindingsView } from "@/lib/usecases/list-findings";
import { DismissFinding } from "./settle-finding";

type Finding = FindingsView["findings"][number];

/** One finding: what was seen, on what it rests, what to do, which packs. */
export function FindingCard(props: { finding: Finding; view: FindingsView; maySettle: boolean }) {
  const { finding, view, maySettle } = props;
  const { locale, timeZone } = view.organisation;
  const words = findingWords(finding, locale);
  const day = (at: Date) => formatDay(dayOfInstant(at, timeZone), locale, { today: view.today });
  return (
    <div id={`finding-${finding.id}`} className="scroll-mt-16">
      <Section title={words.title} aside={`found ${day(finding.foundAt)}`}>
        <div className="grid gap-x-8 gap-y-4 px-3 py-3 lg:grid-cols-2">
          <div>
            <p className="max-w-prose text-lg">{words.evidence}</p>
            {finding.firmwareFrom && finding.firmwareTo && (
              <p className="mt-1 max-w-prose">
                Firmware changed on {formatNumber(finding.firmwareAssets, locale)} of its assets
                between {day(finding.firmwareFrom)} and {day(finding.firmwareTo)}.
              </p>
            )}
            <p className="mt-1 max-w-prose text-soft">{behind(finding, locale)}</p>
            <h3 className="caps mt-4 mb-1">What to do</h3>
            <ol className="flex max-w-prose list-decimal flex-col gap-1 pl-5">
              {words.todo.map((step) => (
                <li key={step}>{step}</li>
              ))}
            </ol>
            {maySettle && (
              <div className="mt-3 -ml-3.5">
                <DismissFinding id={finding.id} called={words.title} />
              </div>
            )}
          </div>
          <Concerned finding={finding} view={view} />
        </div>
      </Section>
    </div>
  );
}

function behind({ packsBehind, chance, kind, designation, cellsLeft }: Finding, locale: string) {
  const luck =
    chance < 1e-6 ? "less than one in a million" : `about ${(chance * 100).toPrecision(1)} %`;
  const basis = `It rests on ${formatNumber(packsBehind, locale)} packs; by luck alone it would show so with a chance of ${luck}, if packs of a kind are alike.`;
  if (kind !== "bad-lot") return basis;
  return `${basis} Of the lot ${formatNumber(cellsLeft, locale)} ${designation} are left in stores and vans.`;
}

function Concerned({ finding, view }: { finding: Finding; view: FindingsView }) {
  const { locale, timeZone } = view.organisation;
  const { packs, packsConcerned } = finding;
  const likely = (p50: string | null) =>
    p50 === null
      ? "no forecast yet"
      : `likely ${formatDay(dayOfInstant(new Date(p50), timeZone), locale, { today: view.today })}`;
  const all =
    finding.kind === "draw-shift" && finding.deviceModelId
      ? `/fleet?model=${finding.deviceModelId}`
      : null;
  return (
    <div>
      <h3 className="caps mb-1">Packs concerned, first to stop first</h3>
      {packs.length === 0 && <p className="text-soft">None of them is in service now.</p>}
      <ul className="divide-y divide-hair">
        {packs.map((pack) => (
          <li key={pack.tag} className="flex flex-wrap items-baseline gap-x-3 py-1.5">
            <Link
              href={`/fleet/${encodeURIComponent(pack.tag)}`}
              className="font-mono text-xs font-semibold hover:underline"
            >
              {pack.tag}
            </Link>
            <span className="min-w-0 flex-1 truncate">{pack.name}</span>
            <span className="text-soft">{likely(pack.p50)}</span>
          </li>
        ))}
      </ul>
      {packsConcerned > packs.length && (
        <p className="mt-1.5 text-soft">
          {formatNumber(packsConcerned, locale)} in service in all
          {all && (
            <>
              ,{" "}
              <Link className="textlink" href={all}>
                all assets of the model
              </Link>
            </>
          )}
          .
        </p>
      )}
    </div>
  );
}
