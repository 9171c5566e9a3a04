import { PartBar } from "@/components/charts/part-bar";
import { Section } from "@/components/ui/page-head";
import { CAUSE_WORDS, CAUSES, type ComparedMeasure } from "@/lib/present/policy-comparison";

/** Green at the site, blue on the road, warm for what comes too late. */
const CAUSE_FILL: Record<string, string> = {
  cells: "fill-spruce",
  work: "fill-spruce opacity-60",
  looking: "fill-spruce opacity-30",
  crewOnTheRoad: "fill-dusk",
  kilometres: "fill-dusk opacity-50",
  urgentTrips: "fill-honey",
  silence: "fill-brick",
  wornStock: "fill-soft opacity-50",
};

/** Cost by cause, stacked on one scale, with what each colour means. */
export function PolicyCosts({ measure }: { measure: ComparedMeasure }) {
  return (
    <Section title={measure.title} aside="the parts in the order of the key">
      <ul className="flex flex-wrap gap-x-5 gap-y-1 px-3 pt-2.5" aria-label="Key">
        {CAUSES.map((cause) => (
          <li key={cause} className="flex items-center gap-1.5">
            <svg aria-hidden width="12" height="12" className="shrink-0">
              <rect width="12" height="12" className={CAUSE_FILL[cause]} />
            </svg>
            {CAUSE_WORDS[cause]}
          </li>
        ))}
      </ul>
      <Bars measure={measure} classOf={(cause) => CAUSE_FILL[cause] ?? "fill-soft"} />
    </Section>
  );
}

/** One measure of every policy. */
export function PolicyBars({ measure }: { measure: ComparedMeasure }) {
  const classOf = (policy: string) => (policy === "wanewright" ? "fill-spruce" : "fill-soft");
  return (
    <Section title={measure.title} aside="a device-year">
      <Bars measure={measure} classOf={classOf} />
    </Section>
  );
}

function Bars(props: { measure: ComparedMeasure; classOf: (key: string) => string }) {
  return (
    <ul className="px-3 py-2">
      {props.measure.bars.map((bar) => (
        <li
          key={bar.policy}
          className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-3 border-b border-hair py-1 last:border-0 sm:grid-cols-[8rem_minmax(0,1fr)_4.5rem]"
        >
          <span className={bar.policy === "wanewright" ? "font-semibold" : ""}>{bar.name}</span>
          <span className="order-last col-span-2 sm:order-none sm:col-span-1">
            <PartBar bar={bar} classOf={props.classOf} />
          </span>
          <span className="text-right font-medium tabular-nums">{bar.value}</span>
        </li>
      ))}
    </ul>
  );
}
