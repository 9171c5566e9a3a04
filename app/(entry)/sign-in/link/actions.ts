"use server";

import { redirect } from "next/navigation";
import { signIn } from "@/lib/server/auth";
import { SignInRefused } from "@/lib/server/sign-in-result";

/** Signs in with the one-time link of a mail. @returns why not */
export async function signInWithLinkAction(
  _: string | null,
  form: FormData,
): Promise<string | null> {
  try {
    await signIn("link", { token: String(form.get("token") ?? ""), redirect: false });
  } catch (error) {
    if (error instanceof SignInRefused) return error.words;
    throw error;
  }
  redirect("/");
}
