import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportAudit } from "@/lib/usecases/export-audit";

/** The list as CSV, under the filters of its own address. */
export const GET = defineRoute(exportAudit, {
  input: (request) => {
    const query = new URL(request.url).searchParams;
    return {
      page: 1,
      act: query.get("act"),
      personId: query.get("person"),
      fromDay: query.get("from"),
      toDay: query.get("to"),
    };
  },
  respond: (text) => csvResponse("audit", text),
});
