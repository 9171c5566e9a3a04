import { defineRoute } from "@/lib/server/define-route";
import { readFieldDay } from "@/lib/usecases/read-field-day";

/** What a phone loads in the morning. The browser keeps no copy: the field pages have their own. */
export const GET = defineRoute(readFieldDay, {
  input: (request) => ({
    technicianId: new URL(request.url).searchParams.get("technician"),
  }),
  respond: (day) => Response.json(day, { headers: { "cache-control": "no-store" } }),
});
