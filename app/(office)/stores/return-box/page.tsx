import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { collectReturnedCells, readReturnBox } from "@/lib/usecases/return-box";
import { ReturnBoxTable } from "../_parts/return-box-table";
import { StoresTabs } from "../_parts/stores-tabs";

export const metadata: Metadata = { title: "Return box" };

export default async function ReturnBoxPage() {
  const actor = await requireActor();
  const view = await readReturnBox(deps(), actor, {});
  return (
    <>
      <PageHead
        title="Return box"
        lede="Old cells that came out of devices and wait for recycling. Lithium cells: terminals taped, damaged ones bagged alone; the carrier’s and local rules come first."
      />
      <StoresTabs current="return-box" />
      <ReturnBoxTable view={view} mayCollect={mayUse(collectReturnedCells, actor)} />
    </>
  );
}
