import { Section } from "@/components/ui/page-head";
import { EmptyState } from "@/components/ui/states";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { findingWords } from "@/lib/present/finding-words";
import { formatDay } from "@/lib/present/format-day";
import type { FindingsView } from "@/lib/usecases/list-findings";
import { FindingCard } from "./finding-card";
import { ReopenFinding } from "./settle-finding";

export interface FindingListProps {
  view: FindingsView;
  maySettle: boolean;
}

/** Open findings with what to do, then those put aside. */
export function FindingList({ view, maySettle }: FindingListProps) {
  const open = view.findings.filter((f) => f.dismissedAt === null);
  return (
    <>
      {open.length === 0 && (
        <Section title="Open findings">
          <EmptyState title="Nothing stands out.">
            No lot dies early and no model draws otherwise, as far as the packs tell that have come
            out and the voltages that were logged. The next look is tonight.
          </EmptyState>
        </Section>
      )}
      {open.map((finding) => (
        <FindingCard key={finding.id} finding={finding} view={view} maySettle={maySettle} />
      ))}
      <Dismissed view={view} maySettle={maySettle} />
    </>
  );
}

function Dismissed({ view, maySettle }: FindingListProps) {
  const { locale, timeZone } = view.organisation;
  const dismissed = view.findings.filter((f) => f.dismissedAt !== null);
  if (dismissed.length === 0) return null;
  return (
    <Section title="Put aside">
      <ul className="divide-y divide-hair px-3">
        {dismissed.map((finding) => (
          <li key={finding.id} className="flex flex-wrap items-center gap-x-6 gap-y-2 py-2.5">
            <div className="min-w-0 flex-1 basis-72">
              <b>{findingWords(finding, locale).title}</b>
              <p className="text-soft">
                {finding.dismissedByName},{" "}
                {finding.dismissedAt &&
                  formatDay(dayOfInstant(finding.dismissedAt, timeZone), locale, {
                    today: view.today,
                  })}
                : {finding.dismissedBecause}
              </p>
            </div>
            {maySettle && <ReopenFinding id={finding.id} />}
          </li>
        ))}
      </ul>
    </Section>
  );
}
