import { defineRoute, jsonBody } from "@/lib/server/define-route";
import { planWeek } from "@/lib/usecases/plan-week";

export const POST = defineRoute(planWeek, { input: (request) => jsonBody(request) });
