import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { pricePlanAct } from "@/lib/usecases/price-plan-act";

export const POST = defineRoute(pricePlanAct, {
  input: async (request, params) => {
    const body: Record<string, unknown> = await jsonBody(request);
    return { ...body, planId: params.id ?? "" } as never;
  },
});
