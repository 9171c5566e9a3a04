import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { log } from "@/lib/server/log";
import { syncEntries } from "@/lib/usecases/sync-entries";

/** The phones' one entrance for writes. */
export const POST = defineRoute(syncEntries, {
  input: (request) => jsonBody(request),
  respond: ({ response, troubles }) => {
    for (const error of troubles) log.error({ act: "sync-entries", error }, "entry failed");
    return Response.json(response, { headers: { "cache-control": "no-store" } });
  },
});
