import type { z } from "zod";
import { type Fault, isAppError } from "@/lib/errors";
import type { UseCase } from "@/lib/usecases/use-case";
import { deps } from "./deps";
import { log } from "./log";
import { requireActor } from "./session";

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

/**
 * Wraps a use case as a server action for `useActionState`.
 * @param read turns the form into the use case's input
 * @param after runs on success (revalidate, redirect)
 */
export function defineAction<Input extends z.ZodType, Result>(
  useCase: UseCase<Input, Result>,
  read: (form: FormData) => z.input<Input>,
  after?: (result: Result, form: FormData) => void | Promise<void>,
) {
  return async (_: ActionState<Result>, form: FormData): Promise<ActionState<Result>> => {
    const actor = await requireActor();
    let result: Result;
    try {
      result = await useCase(deps(), actor, read(form));
    } catch (error) {
      return failure(useCase.definition.name, error, form);
    }
    await after?.(result, form);
    return { status: "done", result };
  };
}

function failure(name: string, error: unknown, form: FormData): ActionState<never> {
  if (!isAppError(error)) log.error({ act: name, error }, "action failed");
  return {
    status: "error",
    message: isAppError(error)
      ? error.message
      : "Something went wrong on our side. What you typed is kept; please try again.",
    faults: isAppError(error) ? error.faults : [],
    values: Object.fromEntries(
      [...form.entries()].filter((e): e is [string, string] => typeof e[1] === "string"),
    ),
  };
}
