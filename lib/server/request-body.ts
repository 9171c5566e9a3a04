import { AppError, invalid, isAppError } from "@/lib/errors";

/**
 * The same request, whose body cannot be read past `limit` bytes: a length that is announced is
 * refused at once, one that is not is counted while it comes in.
 * @throws AppError too_large, at once or from reading the body
 */
export function withinLimit(request: Request, limit: number): Request {
  if (Number(request.headers.get("content-length") ?? 0) > limit) throw tooLarge(limit);
  if (!request.body) return request;
  let bytes = 0;
  const counted = new TransformStream<Uint8Array, Uint8Array>({
    transform(chunk, controller) {
      bytes += chunk.byteLength;
      if (bytes > limit) controller.error(tooLarge(limit));
      else controller.enqueue(chunk);
    },
  });
  const body = request.body.pipeThrough(counted);
  // Streams as bodies need `duplex` (Fetch standard); the DOM's types do not know it.
  return new Request(request, { body, duplex: "half" } as RequestInit);
}

function tooLarge(limit: number): AppError {
  const message = `The body is larger than ${limit} bytes: send it in parts.`;
  return new AppError("too_large", message, [{ field: "body", message }]);
}

/**
 * The body as bytes, read no further than the limit: a sender need not say how much comes.
 * @throws AppError too_large when there is more, invalid when there is nothing
 */
export async function bytesBody(request: Request, limit: number): Promise<Uint8Array<ArrayBuffer>> {
  const bytes = new Uint8Array(await withinLimit(request, limit).arrayBuffer());
  if (bytes.length === 0) throw invalid("The body is empty.");
  return bytes;
}

/** The body as JSON. @throws AppError malformed, naming the sign at which it stops being JSON */
export async function jsonBody(request: Request): Promise<never> {
  try {
    return (await request.json()) as never;
  } catch (error) {
    if (isAppError(error)) throw error;
    const where = error instanceof Error ? error.message : String(error);
    throw new AppError("malformed", "The body is not JSON.", [{ field: "body", message: where }]);
  }
}
