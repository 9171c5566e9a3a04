import type { z } from "zod";
import { AppError, type ErrorCode, invalid, isAppError } from "@/lib/errors";
import type { Actor, UseCase } from "@/lib/usecases/use-case";
import { deps } from "./deps";
import { log } from "./log";
import { actorOfRequest } from "./session";

const STATUS: Record<ErrorCode, number> = {
  invalid: 422,
  not_signed_in: 401,
  forbidden: 403,
  not_found: 404,
  conflict: 409,
  too_many: 429,
  unavailable: 503,
};

type Params = Promise<Record<string, string | string[] | undefined>>;

export interface RouteOptions<Input extends z.ZodType, Result> {
  readonly input: (
    request: Request,
    params: Record<string, string>,
  ) => z.input<Input> | Promise<z.input<Input>>;
  /** Default: 200 with the result as JSON; null gives 204. */
  readonly respond?: (result: Result) => Response;
  /** Largest body accepted, in bytes. */
  readonly bodyLimit?: number;
}

/** Wraps a use case as a route handler: actor, limits, errors to status, one log line. */
export function defineRoute<Input extends z.ZodType, Result>(
  useCase: UseCase<Input, Result>,
  options: RouteOptions<Input, Result>,
) {
  return async (request: Request, context: { params: Params }): Promise<Response> => {
    const started = performance.now();
    let actor: Actor | null = null;
    let response: Response;
    try {
      guardOrigin(request);
      guardSize(request, options.bodyLimit ?? 1_000_000);
      actor = await actorOfRequest(request);
      const params = (await context.params) as Record<string, string>;
      const result = await useCase(deps(), actor, await options.input(request, params));
      response = options.respond?.(result) ?? Response.json(result ?? null);
    } catch (error) {
      response = errorResponse(error);
      if (response.status === 500)
        log.error({ act: useCase.definition.name, error }, "route failed");
    }
    log.info({
      act: useCase.definition.name,
      by: actor?.kind === "person" ? actor.personId : (actor?.kind ?? "nobody"),
      status: response.status,
      ms: Math.round(performance.now() - started),
    });
    return response;
  };
}

/** The body as JSON. @throws AppError invalid when it is not JSON */
export async function jsonBody(request: Request): Promise<never> {
  try {
    return (await request.json()) as never;
  } catch {
    throw invalid("The body is not JSON.");
  }
}

/**
 * The body as bytes, read no further than the limit: a sender need not say how much comes.
 * @throws AppError invalid when there is more, or nothing
 */
export async function bytesBody(request: Request, limit: number): Promise<Uint8Array<ArrayBuffer>> {
  const parts: Uint8Array[] = [];
  let size = 0;
  for await (const part of request.body ?? []) {
    size += part.length;
    if (size > limit) throw tooLarge(limit);
    parts.push(part);
  }
  if (size === 0) throw invalid("The body is empty.");
  return new Uint8Array(Buffer.concat(parts));
}

/** Errors as `{ error: { code, message, faults } }`. */
export function errorResponse(error: unknown): Response {
  const known = isAppError(error) ? error : new AppError("unavailable", "Something went wrong.");
  const status = isAppError(error) ? STATUS[error.code] : 500;
  const body = { error: { code: known.code, message: known.message, faults: known.faults } };
  return Response.json(body, { status, headers: { "cache-control": "no-store" } });
}

/** A browser's write must come from our own pages (cookies are SameSite=Lax besides). */
function guardOrigin(request: Request): void {
  if (request.method === "GET" || request.method === "HEAD") return;
  if (request.headers.has("authorization")) return;
  const site = request.headers.get("sec-fetch-site");
  if (site && site !== "same-origin" && site !== "none") {
    throw new AppError("forbidden", "This request came from another site.");
  }
}

function guardSize(request: Request, limit: number): void {
  if (Number(request.headers.get("content-length") ?? 0) > limit) {
    throw tooLarge(limit);
  }
}

function tooLarge(limit: number): AppError {
  return invalid(`The body is larger than ${limit} bytes.`);
}
