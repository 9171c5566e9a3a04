import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { editPlan } from "@/lib/usecases/edit-plan";

export const POST = defineRoute(editPlan, {
  input: async (request, params) => {
    const body: Record<string, unknown> = await jsonBody(request);
    return { ...body, planId: params.id ?? "" } as never;
  },
});
