import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { readStores } from "@/lib/usecases/read-stores";
import { saveCellType } from "@/lib/usecases/save-cell-type";
import { CellTable } from "./_parts/cell-table";
import { StoresTabs } from "./_parts/stores-tabs";

export const metadata: Metadata = { title: "Stores" };

export default async function StoresPage() {
  const actor = await requireActor();
  const view = await readStores(deps(), actor, {});
  return (
    <>
      <PageHead
        title="Stores"
        lede="Cells by type and place, against the count at which to order."
        actions={
          <>
            <LinkButton download href="/api/v1/exports/cell-types">
              Export CSV
            </LinkButton>
            {mayUse(saveCellType, actor) && (
              <LinkButton href="/stores/cells/new">Add a cell type</LinkButton>
            )}
          </>
        }
      />
      <StoresTabs current="cells" />
      <CellTable view={view} />
    </>
  );
}
