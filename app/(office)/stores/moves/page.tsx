import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { listMoves } from "@/lib/usecases/read-stores";
import { MoveTable } from "../_parts/move-table";
import { StoresTabs } from "../_parts/stores-tabs";

export const metadata: Metadata = { title: "Moves" };
type Search = Promise<Record<string, string | undefined>>;

export default async function MovesPage(props: { searchParams: Search }) {
  const { page } = await props.searchParams;
  const view = await listMoves(deps(), await requireActor(), { page: page ?? "1" });
  return (
    <>
      <PageHead
        title="Moves"
        lede="The book of cells: nothing in it is ever changed."
        actions={
          <LinkButton download href="/api/v1/exports/moves">
            Export CSV
          </LinkButton>
        }
      />
      <StoresTabs current="moves" />
      <MoveTable view={view} />
    </>
  );
}
