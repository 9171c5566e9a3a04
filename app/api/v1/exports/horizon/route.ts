import { readParams } from "@/app/(office)/horizon/_parts/horizon-params";
import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportHorizon } from "@/lib/usecases/export-horizon";

/** The Horizon as CSV, under the filters of the address. */
export const GET = defineRoute(exportHorizon, {
  input: (request) => readParams(Object.fromEntries(new URL(request.url).searchParams)),
  respond: ({ text, today }) => csvResponse(`horizon-${today}`, text),
});
