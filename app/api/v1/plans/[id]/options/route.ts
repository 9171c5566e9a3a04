import { defineRoute } from "@/lib/server/define-route";
import { pricePlanOptions } from "@/lib/usecases/price-plan-options";

export const GET = defineRoute(pricePlanOptions, {
  input: (request, params) => {
    const query = new URL(request.url).searchParams;
    return { planId: params.id ?? "", siteId: query.get("site"), assetId: query.get("asset") };
  },
});
