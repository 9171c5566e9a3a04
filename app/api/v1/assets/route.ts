import { readAssetParams } from "@/app/(office)/fleet/_parts/fleet-params";
import { defineRoute } from "@/lib/server/define-route";
import { listAssets } from "@/lib/usecases/list-assets";

/** One page of assets, under the filters and order of the Fleet's own address. */
export const GET = defineRoute(listAssets, {
  input: (request) => readAssetParams(Object.fromEntries(new URL(request.url).searchParams)),
  respond: ({ rows, total, page, pageSize }) =>
    Response.json({ assets: rows, total, page, pageSize }),
});
