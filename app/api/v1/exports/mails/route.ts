import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportMails } from "@/lib/usecases/export-mails";

/** The list as CSV, under the filters of its own address. */
export const GET = defineRoute(exportMails, {
  input: (request) => {
    const query = new URL(request.url).searchParams;
    return {
      search: query.get("search") ?? "",
      state: query.get("state") as never,
      descending: true,
      page: 1,
    };
  },
  respond: (text) => csvResponse("mails", text),
});
