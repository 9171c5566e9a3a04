import { defineRoute } from "@/lib/server/define-route";
import { readCalendar } from "@/lib/usecases/read-calendar";

export const GET = defineRoute(readCalendar, {
  input: (request) => {
    const query = new URL(request.url).searchParams;
    return { from: query.get("from") ?? "", to: query.get("to") ?? "" };
  },
});
