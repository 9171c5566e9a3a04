import type { z } from "zod";
import type { Kysely } from "kysely";
import type { Database } from "@/db/client";
import { AppError, forbidden, invalid } from "@/lib/errors";
import type { PointOnEarth, TravelTable } from "@/lib/planning/fleet";
import type { Problem, Routes } from "@/lib/routing/problem";
import type { Options } from "@/lib/routing/solve";

export const ROLES = ["administrator", "dispatcher", "supervisor", "technician"] as const;
export type Role = (typeof ROLES)[number];

export interface PersonActor {
  readonly kind: "person";
  readonly personId: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
  /** Set when the person is a technician with a crew. */
  readonly technicianId: string | null;
}
export interface ApiKeyActor {
  readonly kind: "api-key";
  readonly apiKeyId: string;
  readonly scopes: readonly string[];
}
/** The worker acting by itself. */
export interface SystemActor {
  readonly kind: "system";
}
/** Somebody who has not signed in (sign-in, forgotten password, taking up an invitation). */
export interface VisitorActor {
  readonly kind: "visitor";
  /** What attempts are counted under, usually the client's address. */
  readonly origin: string;
}
export type Actor = PersonActor | ApiKeyActor | SystemActor | VisitorActor;

export interface EnqueueOptions {
  /** At most one waiting job per key. */
  readonly singletonKey?: string;
  readonly startAfter?: Date;
}
/** Enqueues inside the caller's transaction: the change and its job are committed together. */
export interface JobQueue {
  enqueue(
    db: Kysely<Database>,
    name: JobName,
    data: Record<string, unknown>,
    options?: EnqueueOptions,
  ): Promise<void>;
}
export interface MailMessage {
  readonly to: string;
  readonly subject: string;
  readonly html: string;
  readonly text: string;
  readonly attachments: readonly {
    readonly filename: string;
    readonly contentType: string;
    readonly content: string;
  }[];
  readonly idempotencyKey: string;
}
/** Sends one mail. `retry` says whether another attempt could succeed. */
export interface Mailer {
  send(
    message: MailMessage,
  ): Promise<
    | { readonly ok: true; readonly providerId: string }
    | { readonly ok: false; readonly reason: string; readonly retry: boolean }
  >;
}

/** Driving times from a service; it says why when it cannot give them. */
export interface TravelService {
  table(
    url: string,
    places: readonly PointOnEarth[],
  ): Promise<
    | { readonly ok: true; readonly table: TravelTable }
    | { readonly ok: false; readonly reason: string }
  >;
}

/**
 * Seeks rounds beside the process's own work: same problem, turns and seed, same routes.
 * @param onNews is told how far the search is and its cost; it answers whether to go on, to stop
 * with the best so far, or to drop it all
 * @returns null when it was told to drop it
 */
export interface RoundsSearch {
  (
    asked: {
      readonly problem: Problem;
      readonly turns: number;
      readonly options: Options;
      readonly seed: number;
    },
    onNews: (news: {
      readonly share: number;
      readonly cost: number;
    }) => Promise<"go on" | "enough" | "drop">,
  ): Promise<Routes | null>;
}

/** Keeps pictures and documents by key, outside the database. */
export interface ObjectStorage {
  /** Overwrites. @throws AppError unavailable when it cannot be kept now */
  put(key: string, bytes: Uint8Array, contentType: string): Promise<void>;
  /** Null: nothing lies there. @throws AppError unavailable when it cannot be asked now */
  get(key: string): Promise<StoredObject | null>;
}
export interface StoredObject {
  readonly body: ReadableStream<Uint8Array>;
  readonly bytes: number;
}
/** Makes a picture of our own from one that somebody sent, or says why it is none. */
export interface ImageCleaner {
  (
    bytes: Uint8Array,
  ): Promise<
    | { readonly ok: true; readonly image: CleanImage }
    | { readonly ok: false; readonly reason: string }
  >;
}
/** A JPEG without metadata, upright. */
export interface CleanImage {
  readonly bytes: Uint8Array;
  readonly width: number;
  readonly height: number;
}

export type JobName =
  "forecast" | "forecast-all" | "plan" | "mail" | "digests" | "import-check" | "import-apply";

export interface Deps {
  readonly db: Kysely<Database>;
  readonly now: () => Date;
  readonly newId: () => string;
  readonly jobs: JobQueue;
  readonly mailer: Mailer;
  /** The address people type, without a slash at its end; links in mails start with it. */
  readonly appUrl: string;
  /** Without it driving times are reckoned by the great circle. */
  readonly travel?: TravelService;
  /** Without it rounds are sought within the process, which does nothing else meanwhile. */
  readonly searchRounds?: RoundsSearch;
  /** Photos are taken in and shown by the web process alone; the worker needs neither. */
  readonly storage?: ObjectStorage;
  readonly cleanImage?: ImageCleaner;
}

export interface Allowed {
  readonly roles?: readonly Role[];
  readonly apiScope?: string;
  readonly system?: boolean;
  readonly visitor?: boolean;
}

export interface UseCaseDefinition<Input extends z.ZodType, Result> {
  /** kebab-case verb phrase: the name in the audit, the log and the matrix test. */
  readonly name: string;
  readonly allow: Allowed;
  readonly input: Input;
  readonly run: (deps: Deps, actor: Actor, input: z.output<Input>) => Promise<Result>;
}

export interface UseCase<Input extends z.ZodType = z.ZodType, Result = unknown> {
  (deps: Deps, actor: Actor, input: z.input<Input>): Promise<Result>;
  readonly definition: UseCaseDefinition<Input, Result>;
}

/**
 * Makes a use case: authorisation first, then the input's schema, then the work.
 * @throws AppError forbidden | not_signed_in | invalid (with one fault a field) | what `run` throws
 */
export function defineUseCase<Input extends z.ZodType, Result>(
  definition: UseCaseDefinition<Input, Result>,
): UseCase<Input, Result> {
  const useCase = async (deps: Deps, actor: Actor, raw: z.input<Input>): Promise<Result> => {
    authorise(definition.allow, actor);
    const parsed = await definition.input.safeParseAsync(raw);
    if (!parsed.success) {
      throw invalid(
        "Some entries need mending.",
        parsed.error.issues.map((i) => ({ field: i.path.join("."), message: i.message })),
      );
    }
    return definition.run(deps, actor, parsed.data);
  };
  return Object.assign(useCase, { definition });
}

/** @throws AppError when the actor may not do this */
export function authorise(allow: Allowed, actor: Actor): void {
  switch (actor.kind) {
    case "system":
      if (allow.system) return;
      throw forbidden();
    case "api-key":
      if (allow.apiScope && actor.scopes.includes(allow.apiScope)) return;
      throw forbidden("This key does not allow this.");
    case "visitor":
      if (allow.visitor) return;
      throw new AppError("not_signed_in", "Please sign in.");
    case "person":
      if (allow.visitor || allow.roles?.some((role) => actor.roles.includes(role))) return;
      throw forbidden();
  }
}

/** The acting person's id for audit columns; null for keys and the worker. */
export function personIdOf(actor: Actor): string | null {
  return actor.kind === "person" ? actor.personId : null;
}
