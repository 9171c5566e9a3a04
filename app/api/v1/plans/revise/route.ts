import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { revisePlan } from "@/lib/usecases/revise-plan";

export const POST = defineRoute(revisePlan, { input: (request) => jsonBody(request) });
