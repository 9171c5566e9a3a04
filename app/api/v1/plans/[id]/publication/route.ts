import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { publishPlan } from "@/lib/usecases/publish-plan";
import { previewPublication } from "@/lib/usecases/read-publication";

/** Who would get which mail. */
export const GET = defineRoute(previewPublication, {
  input: (_request, params) => ({ planId: params.id ?? "" }),
});

export const POST = defineRoute(publishPlan, {
  input: async (request, params) => {
    const body: Record<string, unknown> = await jsonBody(request);
    return { ...body, planId: params.id ?? "" } as never;
  },
});
