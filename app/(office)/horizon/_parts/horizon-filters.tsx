import { LinkButton } from "@/components/ui/button";
import { ChipLink, FilterBar } from "@/components/ui/chip-link";
import { CHEMISTRY_WORDS } from "@/lib/present/chemistry-words";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import type { HorizonView } from "@/lib/usecases/read-horizon";
import type { HorizonParams } from "./horizon-params";
import { HorizonSearch } from "./horizon-search";
import { PickFilter } from "./pick-filter";

const SPANS = [
  ["30", "Next 30 days"],
  ["90", "Next 90 days"],
  ["365", "Next year"],
  ["all", "All"],
] as const;

/** Filters whose state lives in the address, what is shown, and the two acts. */
export function HorizonFilters({ view, params }: { view: HorizonView; params: HorizonParams }) {
  const { input, organisation, rows } = view;
  const to = (changes: Record<string, string | null>) => hrefWith("/horizon", params, changes);
  const total = rows[0]?.total ?? 0;
  return (
    <FilterBar
      summary={pageSummary(input.page, input.pageSize, total, "packs", organisation.locale)}
      actions={
        <>
          <LinkButton href={hrefWith("/api/v1/exports/horizon", params, { page: null })} download>
            Export CSV
          </LinkButton>
          <LinkButton href="/rounds?build=1" kind="go">
            Plan rounds…
          </LinkButton>
        </>
      }
    >
      {SPANS.map(([value, words]) => (
        <ChipLink key={value} href={to({ within: value })} active={input.within === value}>
          {words}
        </ChipLink>
      ))}
      <ChipLink href={to({ booked: input.notBooked ? null : "no" })} active={input.notBooked}>
        Not yet booked
      </ChipLink>
      <PickFilter
        name="crew"
        label="Crew"
        value={input.crew ?? ""}
        choices={[["", "All crews"], ...view.crews.map((c) => [c.id, c.name] as const)]}
        params={params}
      />
      <PickFilter
        name="chemistry"
        label="Chemistry"
        value={input.chemistry ?? ""}
        choices={[["", "Any chemistry"], ...Object.entries(CHEMISTRY_WORDS)]}
        params={params}
      />
      <HorizonSearch params={params} value={input.search} />
    </FilterBar>
  );
}
