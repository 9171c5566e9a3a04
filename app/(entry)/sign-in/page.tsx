import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { safeReturnPath } from "@/lib/server/return-path";
import { currentActor } from "@/lib/server/session";
import { SignInForm } from "./_parts/sign-in-form";

export const metadata: Metadata = { title: "Sign in" };

type Search = Promise<{ from?: string | string[] }>;

export default async function SignInPage({ searchParams }: { searchParams: Search }) {
  const from = safeReturnPath((await searchParams).from);
  if (await currentActor()) redirect(from);
  return <SignInForm from={from} />;
}
