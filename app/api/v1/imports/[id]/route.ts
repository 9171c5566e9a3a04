import { defineRoute } from "@/lib/server/define-route";
import { readImportProgress } from "@/lib/usecases/read-import";

/** How far an import has come. */
export const GET = defineRoute(readImportProgress, {
  input: (_request, params) => ({ importId: params.id ?? "" }),
});
