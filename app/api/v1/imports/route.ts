import { defineRoute } from "@/lib/server/define-route";
import { LARGEST_FILE_BYTES, uploadImport } from "@/lib/usecases/upload-import";

/** Takes a CSV file in: its bytes as the body, `id`, `kind` and `name` in the address. */
export const POST = defineRoute(uploadImport, {
  bodyLimit: LARGEST_FILE_BYTES,
  input: async (request) => {
    const { id, kind, name } = Object.fromEntries(new URL(request.url).searchParams);
    const bytes = new Uint8Array(await request.arrayBuffer());
    return { id: id ?? "", kind: (kind ?? "") as never, fileName: name ?? "", bytes };
  },
});
