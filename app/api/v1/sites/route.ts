import { readSiteParams } from "@/app/(office)/fleet/_parts/fleet-params";
import { defineRoute } from "@/lib/server/define-route";
import { listSites } from "@/lib/usecases/list-sites";

/** One page of sites, under the filters and order of the sites' own address. */
export const GET = defineRoute(listSites, {
  input: (request) => readSiteParams(Object.fromEntries(new URL(request.url).searchParams)),
  respond: ({ rows, total, page, pageSize }) =>
    Response.json({ sites: rows, total, page, pageSize }),
});
