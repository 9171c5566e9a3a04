import { PickFilter } from "@/components/forms/pick-filter";
import { SearchBox } from "@/components/forms/search-box";
import { ChipLink, FilterBar } from "@/components/ui/chip-link";
import { formatNumber } from "@/lib/present/locale";
import { hrefWith } from "@/lib/present/paging";
import type { AssetListView } from "@/lib/usecases/list-assets";
import type { ListParams } from "./fleet-params";
import { CHEMISTRY_WORDS, choices, STATE_WORDS } from "./fleet-words";

/** Search and filters of the fleet; all live in the address. */
export function FleetFilters({ view, params }: { view: AssetListView; params: ListParams }) {
  const pick = { path: "/fleet", params };
  const named = (list: readonly { id: string; name: string }[]) =>
    list.map(({ id, name }) => ({ value: id, label: name }));
  return (
    <FilterBar summary={`${formatNumber(view.total, view.organisation.locale)} assets`}>
      <SearchBox path="/fleet" label="Tag, name or site" params={params} />
      {Object.entries(STATE_WORDS).map(([state, words]) => (
        <ChipLink
          key={state}
          href={hrefWith("/fleet", params, { state: params.state === state ? null : state })}
          active={params.state === state}
        >
          {words}
        </ChipLink>
      ))}
      <PickFilter
        {...pick}
        name="model"
        label="Device model"
        all="All models"
        choices={named(view.models)}
      />
      <PickFilter
        {...pick}
        name="chemistry"
        label="Chemistry"
        all="Any chemistry"
        choices={choices(CHEMISTRY_WORDS)}
      />
      <PickFilter {...pick} name="crew" label="Crew" all="All crews" choices={named(view.crews)} />
      {params.site && (
        <ChipLink href={hrefWith("/fleet", params, { site: null })} active>
          site {params.site}
        </ChipLink>
      )}
    </FilterBar>
  );
}
