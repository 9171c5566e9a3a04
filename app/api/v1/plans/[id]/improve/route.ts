import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { improvePlan } from "@/lib/usecases/improve-plan";

export const POST = defineRoute(improvePlan, {
  input: async (request, params) => {
    const body: Record<string, unknown> = await jsonBody(request);
    return { ...body, planId: params.id ?? "" } as never;
  },
});
