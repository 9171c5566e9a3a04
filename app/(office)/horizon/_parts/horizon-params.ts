import type { z } from "zod";
import type { horizonInput } from "@/lib/usecases/read-horizon";

/** The horizon's address: every filter, the order and the page live in it. */
export type HorizonParams = Record<string, string | undefined>;

/** What stands in the address as the use case's input; what makes no sense falls back. */
export function readParams(params: HorizonParams): z.input<typeof horizonInput> {
  const order = params.order ?? "waiting";
  return {
    within: (params.within ?? "90") as never,
    crew: params.crew || null,
    chemistry: params.chemistry || null,
    notBooked: params.booked === "no",
    search: params.q ?? "",
    order: order as never,
    descending: params.dir ? params.dir === "desc" : order === "waiting",
    page: params.page ?? "1",
    pageSize: 100,
  };
}
