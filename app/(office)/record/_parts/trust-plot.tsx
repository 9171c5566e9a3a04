import { ReliabilityPlot } from "@/components/charts/reliability-plot";
import { Section } from "@/components/ui/page-head";
import { reliabilityPlot } from "@/lib/present/reliability-plot";
import type { TrustView } from "@/lib/usecases/read-trust";

export function TrustPlot({ view }: { view: TrustView }) {
  const model = reliabilityPlot({ bins: view.curve, locale: view.organisation.locale });
  return (
    <Section title="Chance stated, share that had stopped">
      <ReliabilityPlot model={model} />
      <p className="max-w-80 px-3 pb-3 text-soft">
        On the diagonal the windows can be taken at their word: by the date with a chance of 30 %,
        30 % had stopped. Above it, packs end earlier than said. Packs taken out alive count up to
        that day (Kaplan–Meier); bars are 90 % intervals.
      </p>
    </Section>
  );
}
