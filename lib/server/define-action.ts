import type { z } from "zod";
import { AppError, type Fault, isAppError } from "@/lib/errors";
import type { Actor, UseCase } from "@/lib/usecases/use-case";
import { deps } from "./deps";
import { log } from "./log";
import { currentActor, visitor } from "./session";

/** What a form gets back. `values` returns what was typed, so that nothing is lost on an error. */
export type ActionState<Result> =
  | { readonly status: "idle" }
  | { readonly status: "done"; readonly result: Result }
  | {
      readonly status: "error";
      readonly message: string;
      readonly faults: readonly Fault[];
      readonly values: Record<string, string>;
    };

type Read<Input extends z.ZodType> = (form: FormData) => z.input<Input>;
type After<Result> = (result: Result, form: FormData) => void | Promise<void>;

/**
 * Wraps a use case as a server action for `useActionState`. When the session has ended, the
 * form comes back as it was typed, with what to do.
 * @param read turns the form into the use case's input
 * @param after runs on success (revalidate, redirect)
 */
export function defineAction<Input extends z.ZodType, Result>(
  useCase: UseCase<Input, Result>,
  read: Read<Input>,
  after?: After<Result>,
) {
  return actionOf(useCase, { actor: signedIn, read, after });
}

/** The same for somebody who has not signed in. */
export function defineVisitorAction<Input extends z.ZodType, Result>(
  useCase: UseCase<Input, Result>,
  read: Read<Input>,
  after?: After<Result>,
) {
  return actionOf(useCase, { actor: visitor, read, after });
}

interface Parts<Input extends z.ZodType, Result> {
  readonly actor: () => Promise<Actor>;
  readonly read: Read<Input>;
  readonly after: After<Result> | undefined;
}

function actionOf<Input extends z.ZodType, Result>(
  useCase: UseCase<Input, Result>,
  { actor, read, after }: Parts<Input, Result>,
) {
  return async (_: ActionState<Result>, form: FormData): Promise<ActionState<Result>> => {
    let result: Result;
    try {
      result = await useCase(deps(), await actor(), read(form));
    } catch (error) {
      return failure(useCase.definition.name, error, form);
    }
    await after?.(result, form);
    return { status: "done", result };
  };
}

async function signedIn(): Promise<Actor> {
  const actor = await currentActor();
  if (actor) return actor;
  throw new AppError(
    "not_signed_in",
    "Your session has ended. Sign in again in another tab, then send this once more; what you typed is kept.",
  );
}

function failure(name: string, error: unknown, form: FormData): ActionState<never> {
  if (!isAppError(error)) log.error({ act: name, error }, "action failed");
  return {
    status: "error",
    message: isAppError(error)
      ? error.message
      : "Something went wrong on our side. What you typed is kept; please try again.",
    faults: isAppError(error) ? error.faults : [],
    values: typed(form),
  };
}

/** Passwords and files do not travel back; browsers keep neither. */
function typed(form: FormData): Record<string, string> {
  const entries = [...form.entries()].filter(
    (entry): entry is [string, string] =>
      typeof entry[1] === "string" && !/password|present|token/i.test(entry[0]),
  );
  return Object.fromEntries(entries);
}
