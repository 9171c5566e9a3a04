import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { planWeek } from "@/lib/usecases/plan-week";

export const POST = defineRoute(planWeek, { input: (request) => jsonBody(request) });
