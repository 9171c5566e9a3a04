import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportClaims } from "@/lib/usecases/export-claims";

/** The list as CSV, under the filters of its own address. */
export const GET = defineRoute(exportClaims, {
  input: (request) => {
    const query = new URL(request.url).searchParams;
    return {
      days: query.get("days") ?? "365",
      crew: query.get("crew"),
    };
  },
  respond: (text) => csvResponse("forecasts-on-record", text),
});
