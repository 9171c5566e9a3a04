import { LinkButton } from "@/components/ui/button";
import { ChipLink, FilterBar } from "@/components/ui/chip-link";
import { hrefWith } from "@/lib/present/paging";
import { TRUST_GROUPS, type TrustView } from "@/lib/usecases/read-trust";

const SPANS = [
  [90, "Last quarter"],
  [365, "Last year"],
  [1100, "Three years"],
] as const;
const GROUP_WORDS = {
  chemistry: "chemistry",
  model: "device model",
  crew: "crew",
  quarter: "quarter",
};

export function TrustFilters(props: {
  view: TrustView;
  params: Record<string, string | undefined>;
}) {
  const { view, params } = props;
  const to = (changes: Record<string, string | number | null>) =>
    hrefWith("/record", params, changes);
  return (
    <FilterBar
      actions={
        <LinkButton href={hrefWith("/api/v1/exports/claims", params, {})} download>
          Export CSV
        </LinkButton>
      }
    >
      {SPANS.map(([days, words]) => (
        <ChipLink key={days} href={to({ days })} active={view.input.days === days}>
          {words}
        </ChipLink>
      ))}
      {view.crews.map((crew) => (
        <ChipLink
          key={crew.id}
          href={to({ crew: view.input.crew === crew.id ? null : crew.id })}
          active={view.input.crew === crew.id}
        >
          {crew.name}
        </ChipLink>
      ))}
      <span className="caps ml-2">by</span>
      {TRUST_GROUPS.map((group) => (
        <ChipLink key={group} href={to({ group })} active={view.input.group === group}>
          {GROUP_WORDS[group]}
        </ChipLink>
      ))}
    </FilterBar>
  );
}
