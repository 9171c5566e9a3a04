import { defineRoute } from "@/lib/server/define-route";
import { bytesBody } from "@/lib/server/request-body";
import { keepPhoto, MAX_PHOTO_BYTES } from "@/lib/usecases/keep-photo";

/** The phones' entrance for photos: the body is the picture, the address says what it belongs to. */
export const PUT = defineRoute(keepPhoto, {
  bodyLimit: MAX_PHOTO_BYTES,
  input: async (request, { id = "" }) => {
    const query = new URL(request.url).searchParams;
    const given = (name: string) => query.get(name) ?? "";
    return {
      id,
      entryId: given("entry"),
      personId: given("person"),
      takenAt: given("taken"),
      sentAt: given("sent"),
      position: query.has("lat")
        ? { latitude: Number(given("lat") || NaN), longitude: Number(given("lon") || NaN) }
        : null,
      bytes: await bytesBody(request, MAX_PHOTO_BYTES),
    };
  },
});
