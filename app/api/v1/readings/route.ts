import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { postReadings } from "@/lib/usecases/post-readings";

/** Logs up to 1,000 voltages; each item gets its own result, a repeat changes nothing. */
export const POST = defineRoute(postReadings, {
  input: jsonBody,
  // 207: some items were refused, and the body says which.
  respond: (result) => Response.json(result, { status: result.refused > 0 ? 207 : 200 }),
});
