import { LinkButton } from "@/components/ui/button";
import type { AssetView } from "@/lib/usecases/read-asset";
import type { ActContext } from "./act-context";
import { DrawDialog } from "./draw-dialog";
import { InstallDialog } from "./install-dialog";
import { LogDialog } from "./log-dialog";
import { RemoveDialog } from "./remove-dialog";
import { StateDialog } from "./state-dialog";
import { SwapDialog } from "./swap-dialog";

/** Everything that can be done with an asset from the office. */
export function AssetActs({ view, context }: { view: AssetView; context: ActContext }) {
  const { asset, pack } = view;
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
