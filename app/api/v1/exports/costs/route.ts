import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportCosts } from "@/lib/usecases/export-costs";

/** The list as CSV, under the filters of its own address. */
export const GET = defineRoute(exportCosts, {
  input: (request) => {
    const query = new URL(request.url).searchParams;
    return {
      days: query.get("days") ?? "730",
    };
  },
  respond: (text) => csvResponse("costs", text),
});
