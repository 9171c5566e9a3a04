import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { safeReturnPath } from "@/lib/server/return-path";
import { currentActor } from "@/lib/server/session";
import { LeavePhone } from "./_parts/leave-phone";
import { SignInForm } from "./_parts/sign-in-form";

export const metadata: Metadata = { title: "Sign in" };

type Search = Promise<{ from?: string | string[]; left?: string }>;

export default async function SignInPage({ searchParams }: { searchParams: Search }) {
  const { from: asked, left } = await searchParams;
  const from = safeReturnPath(asked);
  if (await currentActor()) redirect(from);
  return (
    <>
      {left && <LeavePhone />}
      <SignInForm from={from} />
    </>
  );
}
