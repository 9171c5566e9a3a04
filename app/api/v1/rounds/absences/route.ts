import { defineRoute } from "@/lib/server/define-route";
import { jsonBody } from "@/lib/server/request-body";
import { markAbsent } from "@/lib/usecases/mark-absent";

export const POST = defineRoute(markAbsent, { input: (request) => jsonBody(request) });
