import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportPeople } from "@/lib/usecases/export-people";

/** The list as CSV, under the filters of its own address. */
export const GET = defineRoute(exportPeople, {
  input: (request) => {
    const query = new URL(request.url).searchParams;
    return {
      search: query.get("search") ?? "",
      role: query.get("role") as never,
      state: query.get("state") as never,
      order: query.get("order") as never,
      descending: query.get("down") === "1",
      page: 1,
    };
  },
  respond: (text) => csvResponse("people", text),
});
