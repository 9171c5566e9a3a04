import { defineRoute, jsonBody } from "@/lib/server/define-route";
import { improvePlan } from "@/lib/usecases/improve-plan";

export const POST = defineRoute(improvePlan, {
  input: async (request, params) => {
    const body: Record<string, unknown> = await jsonBody(request);
    return { ...body, planId: params.id ?? "" } as never;
  },
});
