import { ReliabilityPlot } from "@/components/charts/reliability-plot";
import { Section } from "@/components/ui/page-head";
import { reliabilityPlot } from "@/lib/present/reliability-plot";
import type { TrustView } from "@/lib/usecases/read-trust";

export function TrustPlot({ view }: { view: TrustView }) {
  const model = reliabilityPlot({ bins: view.bins, locale: view.organisation.locale });
  return (
    <Section title="Chance stated, share that came true">
      <ReliabilityPlot model={model} />
      <p className="mt-2 max-w-80 text-soft">
        On the diagonal the words can be taken at their value: of the packs given 30 %, 30 % had
        stopped. Bars are 90 % intervals; a dot’s area is its count.
      </p>
    </Section>
  );
}
