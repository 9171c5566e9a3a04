import { defineRoute, jsonBody } from "@/lib/server/define-route";
import { revisePlan } from "@/lib/usecases/revise-plan";

export const POST = defineRoute(revisePlan, { input: (request) => jsonBody(request) });
