import { Section } from "@/components/ui/page-head";
import { misfitWords } from "@/lib/present/cell-choice-words";
import { CHEMISTRY_WORDS } from "@/lib/present/chemistry-words";
import type { CellComparison } from "@/lib/usecases/compare-cells";

/** Cells that do not fit, each with why. */
export function CellMisfits({ view }: { view: CellComparison }) {
  const { choice, organisation } = view;
  if (choice.unfit.length === 0) return null;
  return (
    <Section title="Cells that do not fit, and why">
      <dl className="grid gap-x-6 gap-y-2 px-3 py-3 sm:grid-cols-[minmax(0,14rem)_minmax(0,1fr)]">
        {choice.unfit.map(({ cell, fit }) => (
          <div key={cell.id} className="contents">
            <dt>
              <b>{cell.designation}</b>{" "}
              <span className="text-soft">{CHEMISTRY_WORDS[cell.spec.chemistry]}</span>
            </dt>
            <dd className="max-w-prose">
              {cell.accepted && "The device model lists it, but "}
              {fit.misfits.map((misfit) => misfitWords(misfit, organisation.locale)).join("; ")}.
            </dd>
          </div>
        ))}
      </dl>
    </Section>
  );
}
