import { defineRoute } from "@/lib/server/define-route";
import { discardPlan } from "@/lib/usecases/discard-plan";

export const DELETE = defineRoute(discardPlan, {
  input: (_request, params) => ({ planId: params.id ?? "" }),
});
