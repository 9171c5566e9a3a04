import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listDeviceModels } from "@/lib/usecases/list-device-models";
import { saveDeviceModel } from "@/lib/usecases/save-device-model";
import { FleetTabs } from "../_parts/fleet-tabs";
import { ModelTable } from "../_parts/model-table";

export const metadata: Metadata = { title: "Device models" };

export default async function ModelsPage() {
  const actor = await requireActor();
  const view = await listDeviceModels(deps(), actor, {});
  return (
    <>
      <PageHead
        title="Device models"
        lede="What each kind of device draws, and the voltage at which it stops."
        actions={
          <>
            <LinkButton download href="/api/v1/exports/device-models">
              Export CSV
            </LinkButton>
            {mayUse(saveDeviceModel, actor) && (
              <LinkButton kind="go" href="/fleet/models/new">
                Add a model
              </LinkButton>
            )}
          </>
        }
      />
      <FleetTabs current="models" />
      <ModelTable view={view} />
    </>
  );
}
