import { Section } from "@/components/ui/page-head";
import { formatDay } from "@/lib/present/format-day";
import { formatNumber } from "@/lib/present/locale";
import type { PoliciesView } from "@/lib/usecases/read-policies";

/** How the numbers came about, and what they do not show. */
export function PolicyMethod({ view }: { view: PoliciesView }) {
  const { record, locale } = view;
  const years = record.years === 1 ? "One year" : `${formatNumber(record.years, locale)} years`;
  return (
    <Section title="How this was obtained">
      <div className="grid gap-x-8 gap-y-3 px-3 py-3 text-soft lg:grid-cols-2 [&_p]:max-w-prose [&_p+p]:mt-2">
        <div>
          <p>
            {years} of {formatNumber(record.assets, locale)} assets of the demonstration, from the
            ages its history leaves, in a simulator that shares no equation with the forecasts.
            Every policy has the same worlds, crews, absences, prices and search for the rounds; the
            same rule sends each of them on an urgent trip.
          </p>
          <p>
            <b>Fixed interval</b>: an age for each device model. <b>Below a voltage</b>: an interval
            of inspections and a voltage at which the pack is swapped. Both were set on other worlds
            ({record.setOn.join(", ")}). <b>Run to failure</b>: a swap once the device is silent.{" "}
            <b>Wanewright</b>: a plan each Monday from nothing but its own records.
          </p>
          <p>
            Measured on {formatDay(record.measuredOn, locale, { year: true })}, worlds{" "}
            {record.seeds.join(", ")}; {record.machine}.
          </p>
          <p className="break-words">
            To measure it again: <code className="font-mono text-xs">{record.command}</code>
          </p>
        </div>
        <div>
          <p>
            <b>What it does not show.</b> A real fleet: devices, cells, weather and meters are drawn
            from spreads that were assumed. Days of notice, stock that runs out and weak deliveries
            were left out for all four.
          </p>
          <p>
            A fixed interval here keeps its dates to the week; one that lets them slip to suit the
            rounds would drive less. Few worlds were lived through: differences of a few per cent
            between two policies say nothing.
          </p>
          <p>
            Charge used up beyond what was put in is counted, with its cells and work in proportion,
            so that no policy is thanked for leaving old packs behind; below zero it left the packs
            fuller than it found them.
          </p>
        </div>
      </div>
    </Section>
  );
}
