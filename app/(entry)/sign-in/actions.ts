"use server";

import { redirect } from "next/navigation";
import { signIn } from "@/lib/server/auth";
import { safeReturnPath } from "@/lib/server/return-path";
import { SignInRefused } from "@/lib/server/sign-in-result";

export interface SignInState {
  readonly message: string | null;
  readonly email: string;
}

/** Signs in with mail address and password. */
export async function signInAction(_: SignInState, form: FormData): Promise<SignInState> {
  const email = String(form.get("email") ?? "");
  const password = String(form.get("password") ?? "");
  try {
    await signIn("password", { email, password, redirect: false });
  } catch (error) {
    if (error instanceof SignInRefused) return { message: error.words, email };
    throw error;
  }
  redirect(safeReturnPath(form.get("from")));
}
