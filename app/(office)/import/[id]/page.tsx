import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { readImport } from "@/lib/usecases/read-import";
import { ImportReport } from "../_parts/import-report";
import { ImportRows } from "../_parts/import-rows";
import { ImportSettings } from "../_parts/import-settings";
import { ImportWaiting } from "../_parts/import-waiting";
import { KIND_WORDS, STATE_WORDS } from "../_parts/import-words";

export const metadata: Metadata = { title: "Import" };

interface Props {
  params: Promise<{ id: string }>;
  searchParams: Promise<Record<string, string | undefined>>;
}

export default async function ImportRunPage(props: Props) {
  const { id: importId } = await props.params;
  const { delimiter, show, page } = await props.searchParams;
  const input = { importId, delimiter: delimiter as never, show: show as never, page: page ?? "1" };
  const view = await orNotFound(async () => readImport(deps(), await requireActor(), input));
  const { state, fileName, kind } = view.run;
  const waiting = state === "checking" || state === "importing";
  return (
    <>
      <PageHead
        crumb={{ label: "Import", href: "/import" }}
        title={fileName}
        lede={`${KIND_WORDS[kind]} · ${STATE_WORDS[state]}`}
      />
      {waiting && <ImportWaiting importId={importId} state={state} />}
      {!waiting && view.run.report && <ImportReport view={view} />}
      {!waiting && state !== "imported" && <ImportSettings key={view.delimiter} view={view} />}
      {!waiting && view.run.report && !view.run.report.trouble && <ImportRows view={view} />}
    </>
  );
}
