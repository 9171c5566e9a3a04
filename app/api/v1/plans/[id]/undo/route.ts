import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { undoPlanEdit } from "@/lib/usecases/undo-plan-edit";

export const POST = defineRoute(undoPlanEdit, {
  input: async (request, params) => {
    const body: Record<string, unknown> = await jsonBody(request);
    return { ...body, planId: params.id ?? "" } as never;
  },
});
