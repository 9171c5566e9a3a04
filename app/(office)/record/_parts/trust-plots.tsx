import type { ReactNode } from "react";
import { PredictionPlot } from "@/components/charts/prediction-plot";
import { ReliabilityPlot } from "@/components/charts/reliability-plot";
import { Section } from "@/components/ui/page-head";
import { predictionPlot } from "@/lib/present/prediction-plot";
import { reliabilityPlot } from "@/lib/present/reliability-plot";
import type { TrustView } from "@/lib/usecases/read-trust";

/** Stated chances against what came true, and days left as said against as found. */
export function TrustPlots({ view }: { view: TrustView }) {
  const { locale } = view.organisation;
  const chances = reliabilityPlot({ bins: view.curve, locale });
  const days = predictionPlot(view.predictions, locale);
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-x-6 lg:grid-cols-2">
      <Section title="Chance stated, share that had stopped">
        <PlotWithWords plot={<ReliabilityPlot model={chances} />}>
          On the diagonal the windows can be taken at their word: by the date with a chance of 30 %,
          30 % had stopped. Above it, packs end earlier than said. Each pack counts once, with the
          first forecast on record; those that run, or came out alive, count up to that day
          (Kaplan–Meier). Bars are 90 % intervals.
        </PlotWithWords>
      </Section>
      <Section title="Days left, as said and as found">
        <PlotWithWords plot={<PredictionPlot model={days} />}>
          One mark a pack, from its first forecast on record. Filled: it stopped. Open: it runs, or
          came out alive, and would have lasted longer. In the shaded band it lasted half to twice
          the days said: {days.description}.
        </PlotWithWords>
      </Section>
    </div>
  );
}

function PlotWithWords({ plot, children }: { plot: ReactNode; children: ReactNode }) {
  return (
    <div className="grid gap-x-4 sm:grid-cols-[minmax(0,20rem)_minmax(0,1fr)]">
      {plot}
      <p className="max-w-prose px-3 py-3 text-soft">{children}</p>
    </div>
  );
}
