import { defineRoute } from "@/lib/server/define-route";
import { readPhoto } from "@/lib/usecases/read-photo";

/** A photo, streamed to those who may see it. */
export const GET = defineRoute(readPhoto, {
  input: (_request, { id = "" }) => ({ id }),
  respond: ({ body, bytes }) =>
    new Response(body, {
      headers: {
        "content-type": "image/jpeg",
        "content-length": String(bytes),
        "cache-control": "private, no-store",
        "content-disposition": "inline",
      },
    }),
});
