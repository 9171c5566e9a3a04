import { redirect } from "next/navigation";
import { signIn } from "./auth";
import { SignInRefused } from "./sign-in-result";

/** Signs in with a password that was just chosen, and goes to the first page. */
export async function signInAfterwards(
  email: string,
  password: string,
  path = "/",
): Promise<never> {
  try {
    await signIn("password", { email, password, redirect: false });
  } catch (error) {
    // The password is set; signing in by hand will say what is wrong.
    if (error instanceof SignInRefused) redirect("/sign-in");
    throw error;
  }
  redirect(path);
}
