"use client";

import Link from "next/link";
import { useActionState } from "react";
import { Button } from "@/components/ui/button";
import { TextInput } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";
import { signInAction } from "../actions";

/** Mail address and password; the address stays after a refusal. */
export function SignInForm({ from }: { from: string }) {
  const [state, act, busy] = useActionState(signInAction, { message: null, email: "" });
  return (
    <form action={act} className="border-t-2 border-ink pt-5">
      <h1 className="mb-4 text-2xl">Sign in</h1>
      {state.message && <Notice kind="trouble">{state.message}</Notice>}
      <input type="hidden" name="from" value={from} />
      <div className="flex flex-col gap-4">
        <TextInput
          name="email"
          label="Mail address"
          type="email"
          autoComplete="username"
          defaultValue={state.email}
          maxLength={254}
        />
        <TextInput
          name="password"
          label="Password"
          type="password"
          autoComplete="current-password"
          maxLength={1000}
        />
        <Button type="submit" kind="go" busy={busy && "Signing in…"} className="min-h-12">
          Sign in
        </Button>
      </div>
      <p className="mt-5 flex flex-wrap gap-x-5 gap-y-1">
        <Link className="textlink inline-flex min-h-11 items-center" href="/sign-in/by-mail">
          Sign in by a mail link
        </Link>
        <Link className="textlink inline-flex min-h-11 items-center" href="/forgotten">
          Password forgotten
        </Link>
      </p>
    </form>
  );
}
