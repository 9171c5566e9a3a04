import { CredentialsSignin } from "next-auth";
import { isAppError } from "@/lib/errors";
import type { SignedIn } from "@/lib/usecases/sign-in-with-password";
import type { VisitorActor } from "@/lib/usecases/use-case";
import { log } from "./log";
import { originOf } from "./origin";

/** A refusal that carries its words to the sign-in page. */
export class SignInRefused extends CredentialsSignin {
  constructor(
    override readonly code: string,
    readonly words: string,
  ) {
    super(words);
  }
}

/**
 * Runs a sign-in for next-auth: the request's origin becomes the visitor, an expected refusal
 * becomes the error next-auth knows.
 */
export async function asSignedIn(
  request: Request,
  signIn: (visitor: VisitorActor) => Promise<SignedIn>,
): Promise<SignedIn> {
  try {
    return await signIn({ kind: "visitor", origin: originOf(request.headers) });
  } catch (error) {
    if (!isAppError(error)) {
      log.error({ act: "sign-in", error }, "sign-in failed");
      throw new SignInRefused("unavailable", "Sign-in does not work just now; please try again.");
    }
    throw new SignInRefused(error.code, error.message);
  }
}
