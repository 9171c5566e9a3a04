import { readAssetParams, readSiteParams } from "@/app/(office)/fleet/_parts/fleet-params";
import { csvResponse } from "@/lib/server/csv-response";
import { defineRoute } from "@/lib/server/define-route";
import { exportList } from "@/lib/usecases/export-list";

/** A list of the register or the stores as CSV, under the filters of its own address. */
export const GET = defineRoute(exportList, {
  input: (request, params) => {
    const query = Object.fromEntries(new URL(request.url).searchParams);
    return {
      list: params.list as never,
      assets: readAssetParams(query),
      sites: readSiteParams(query),
    };
  },
  respond: ({ name, text }) => csvResponse(name, text),
});
