import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listImports } from "@/lib/usecases/read-import";
import { NoPermission } from "../_parts/no-permission";
import { FleetTabs } from "../fleet/_parts/fleet-tabs";
import { ImportList } from "./_parts/import-list";
import { UploadForm } from "./_parts/upload-form";

export const metadata: Metadata = { title: "Import" };

export default async function ImportPage() {
  const actor = await requireActor();
  if (!mayUse(listImports, actor)) return <NoPermission title="Import" who="dispatchers" />;
  const view = await listImports(deps(), actor, {});
  return (
    <>
      <PageHead
        title="Import"
        lede="A CSV file is looked at first: you see what each row would do before anything is written. The same file again changes nothing."
      />
      <FleetTabs current="import" />
      <UploadForm />
      <ImportList view={view} />
    </>
  );
}
