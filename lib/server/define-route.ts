import type { z } from "zod";
import { AppError, type ErrorCode, isAppError } from "@/lib/errors";
import type { Actor, UseCase } from "@/lib/usecases/use-case";
import { deps } from "./deps";
import { limitCalls } from "./limit-calls";
import { log } from "./log";
import { withinLimit } from "./request-body";
import { actorOfRequest } from "./session";

const STATUS: Record<ErrorCode, number> = {
  invalid: 422,
  malformed: 400,
  too_large: 413,
  not_signed_in: 401,
  forbidden: 403,
  not_found: 404,
  conflict: 409,
  too_many: 429,
  unavailable: 503,
};

/** RFC 9110, 11.6.1: a 401 says how to prove oneself; RFC 6585, 4: a 429 may say when to come again. */
const HINTS: Readonly<Record<number, Record<string, string>>> = {
  401: { "www-authenticate": 'Bearer realm="wanewright"' },
  429: { "retry-after": "60" },
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
      const limited = withinLimit(request, options.bodyLimit ?? 1_000_000);
      actor = await actorOfRequest(request);
      if (actor.kind === "api-key") await limitCalls(deps(), actor.apiKeyId);
      const params = (await context.params) as Record<string, string>;
      const result = await useCase(deps(), actor, await options.input(limited, params));
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

/** Errors as `{ error: { code, message, faults } }`. */
export function errorResponse(error: unknown): Response {
  const known = isAppError(error) ? error : new AppError("unavailable", "Something went wrong.");
  const status = isAppError(error) ? STATUS[error.code] : 500;
  const body = { error: { code: known.code, message: known.message, faults: known.faults } };
  return Response.json(body, {
    status,
    headers: { "cache-control": "no-store", ...HINTS[status] },
  });
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
