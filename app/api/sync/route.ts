import { defineRoute, jsonBody } from "@/lib/server/define-route";
import { syncEntries } from "@/lib/usecases/sync-entries";

/** The phones' one entrance for writes. */
export const POST = defineRoute(syncEntries, { input: (request) => jsonBody(request) });
