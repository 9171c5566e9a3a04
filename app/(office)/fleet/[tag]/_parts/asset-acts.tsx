import { LinkButton } from "@/components/ui/button";
import { dayOfInstant } from "@/lib/present/calendar-days";
import { formatTime } from "@/lib/present/format-time";
import type { AssetView, SwapChoices } from "@/lib/usecases/read-asset";
import type { ActContext } from "./act-context";
import { DrawDialog } from "./draw-dialog";
import { InstallDialog } from "./install-dialog";
import { LogDialog } from "./log-dialog";
import { RemoveDialog } from "./remove-dialog";
import { StateDialog } from "./state-dialog";
import { SwapDialog } from "./swap-dialog";

/** Everything that can be done with an asset from the office. */
export function AssetActs({ view, choices }: { view: AssetView; choices: SwapChoices }) {
  const { asset, pack, organisation, now } = view;
  const day = dayOfInstant(now, organisation.timeZone);
  const clock = formatTime(now, { ...organisation, locale: "en-GB" }).slice(0, 5);
  const context: ActContext = {
    ...{ assetId: asset.id, tag: asset.tag, now: `${day}T${clock}`, choices },
    ...{ packId: pack?.id ?? null, series: asset.series, parallel: asset.parallel },
  };
  return (
    <>
      <LinkButton kind="quiet" href={`/fleet/${encodeURIComponent(asset.tag)}/edit`}>
        Edit
      </LinkButton>
      <StateDialog context={context} state={asset.state} />
      <DrawDialog context={context} />
      {pack && <RemoveDialog context={context} />}
      {pack && <SwapDialog context={context} />}
      {pack ? <LogDialog context={context} /> : <InstallDialog context={context} />}
    </>
  );
}
