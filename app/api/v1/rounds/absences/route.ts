import { defineRoute, jsonBody } from "@/lib/server/define-route";
import { markAbsent } from "@/lib/usecases/mark-absent";

export const POST = defineRoute(markAbsent, { input: (request) => jsonBody(request) });
