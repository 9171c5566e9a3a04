import { defineRoute } from "@/lib/server/define-route";
import { readAsset } from "@/lib/usecases/read-asset";

/** One asset with its pack, its voltages and the forecast that stands. */
export const GET = defineRoute(readAsset, {
  input: (_request, params) => ({ tag: decodeURIComponent(params.tag ?? "") }),
  respond: ({ asset, pack, readings, forecast }) =>
    Response.json({ asset, pack, readings, forecast }),
});
