import { defineRoute } from "@/lib/server/define-route";
import { readMap } from "@/lib/usecases/read-map";

export const GET = defineRoute(readMap, {
  input: (request) => {
    const query = new URL(request.url).searchParams;
    return { within: (query.get("within") ?? "90") as "90", week: query.get("week") };
  },
});
