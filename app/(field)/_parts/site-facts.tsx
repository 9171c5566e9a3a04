import { Caution } from "@/components/ui/notice";
import type { DaySite } from "@/lib/sync/day-pack";
import { HAZARD_CAUTIONS, TICKET_WORDS } from "./field-words";

/** How to get in, whom to call, what can hurt on the way; `named`: its name heads the page already. */
export function SiteFacts({ site, named }: { site: DaySite; named: boolean }) {
  const facts: [string, string][] = [];
  if (site.keyCode) facts.push(["Key", site.keyCode]);
  if (site.opens && site.closes) facts.push(["Open", `${site.opens}–${site.closes}`]);
  const tickets = site.tickets.map((ticket) => TICKET_WORDS[ticket] ?? ticket);
  if (tickets.length > 0) facts.push(["Ticket", tickets.join(", ")]);
  for (const closure of site.closures) {
    facts.push(["Closed", `${closure.from} to ${closure.to} ${closure.reason}`.trim()]);
  }
  return (
    <section aria-label="Site" className="flex flex-col gap-3">
      <p>
        {!named && <span className="font-semibold">{site.name} </span>}
        <span className="font-mono text-sm text-soft">{site.code}</span>
        {site.notes && <span className="block text-soft">{site.notes}</span>}
      </p>
      {facts.length > 0 && (
        <dl className="grid grid-cols-[auto_1fr] gap-x-4 gap-y-1">
          {facts.map(([term, fact]) => (
            <div key={`${term}${fact}`} className="contents">
              <dt className="text-soft">{term}</dt>
              <dd>{fact}</dd>
            </div>
          ))}
        </dl>
      )}
      {site.contactPhone && (
        <a className="textlink inline-flex min-h-12 items-center" href={`tel:${site.contactPhone}`}>
          Call {site.contactName ?? "the contact"}: {site.contactPhone}
        </a>
      )}
      {site.hazards.map((hazard) => {
        const words = HAZARD_CAUTIONS[hazard];
        return words ? (
          <Caution key={hazard} title={words.title} defer="Site rules come first.">
            {words.text}
          </Caution>
        ) : null;
      })}
    </section>
  );
}
