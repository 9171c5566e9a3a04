import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { lockStop } from "@/lib/usecases/lock-stop";

export const POST = defineRoute(lockStop, {
  input: async (request, params) => {
    const body: Record<string, unknown> = await jsonBody(request);
    return { ...body, planId: params.id ?? "" } as never;
  },
});
