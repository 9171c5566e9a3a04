import { defineRoute } from "@/lib/server/define-route";
import { readRoundsBoard } from "@/lib/usecases/read-rounds-board";

export const GET = defineRoute(readRoundsBoard, {
  input: (request) => {
    const query = new URL(request.url).searchParams;
    return {
      week: query.get("week"),
      planId: query.get("plan"),
      roundId: query.get("round"),
      crewId: query.get("crew"),
    };
  },
});
