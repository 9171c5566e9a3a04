import { Pager } from "@/components/ui/pager";
import { horizonAxis, horizonHead, horizonRow } from "@/lib/present/horizon";
import { hrefWith, pageSummary } from "@/lib/present/paging";
import { stripScale } from "@/lib/present/span-strip";
import type { HorizonView } from "@/lib/usecases/read-horizon";
import type { HorizonParams } from "./horizon-params";
import { HorizonRows } from "./horizon-rows";

const STRIP_PX = 430;

/** Every pack by when it will reach cut-off, on one time axis. */
export function HorizonTable({ view, params }: { view: HorizonView; params: HorizonParams }) {
  const { organisation, today, input, rows } = view;
  const axis = horizonAxis(today, organisation.locale, STRIP_PX);
  const total = rows[0]?.total ?? 0;
  return (
    <>
      <HorizonRows
        scale={stripScale(axis, today)}
        head={horizonHead(axis, today, organisation.locale, view.weeks)}
        rows={rows.map((row) => horizonRow(row, axis, today, organisation))}
        findings={view.findings}
        order={input.order}
        descending={input.descending}
        params={params}
      />
      <Pager
        page={input.page}
        pageCount={Math.max(1, Math.ceil(total / input.pageSize))}
        summary={pageSummary(input.page, input.pageSize, total, "packs", organisation.locale)}
        hrefFor={(page) => hrefWith("/horizon", params, { page })}
      />
    </>
  );
}
