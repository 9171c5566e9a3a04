import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportDemand } from "@/lib/usecases/export-demand";

/** Demand by month and the order proposal, as the screen shows them. */
export const GET = defineRoute(exportDemand, {
  input: (request) => ({ months: new URL(request.url).searchParams.get("months") ?? "6" }),
  respond: (text) => csvResponse("demand", text),
});
