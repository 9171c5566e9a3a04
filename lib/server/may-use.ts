import { authorise, type Actor, type UseCase } from "@/lib/usecases/use-case";

/** Whether a page should offer this: the same rule by which the use case decides. */
export function mayUse(
  useCase: { readonly definition: Pick<UseCase["definition"], "allow"> },
  actor: Actor,
): boolean {
  try {
    authorise(useCase.definition.allow, actor);
    return true;
  } catch {
    return false;
  }
}
