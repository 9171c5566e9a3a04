import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportReadingsInDoubt } from "@/lib/usecases/export-readings-in-doubt";

/** The list of readings in doubt as CSV. */
export const GET = defineRoute(exportReadingsInDoubt, {
  input: () => ({}),
  respond: (text) => csvResponse("readings-in-doubt", text),
});
