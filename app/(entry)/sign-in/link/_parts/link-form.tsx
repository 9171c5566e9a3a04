"use client";

import { useActionState } from "react";
import { Button } from "@/components/ui/button";
import { Notice } from "@/components/ui/notice";
import { signInWithLinkAction } from "../actions";

/** One button that uses the link up. */
export function LinkForm({ token }: { token: string }) {
  const [message, act, busy] = useActionState(signInWithLinkAction, null);
  return (
    <form action={act} className="flex flex-col">
      {message && <Notice kind="trouble">{message}</Notice>}
      <input type="hidden" name="token" value={token} />
      <Button type="submit" kind="go" busy={busy && "Signing in…"} className="min-h-12">
        Sign in
      </Button>
    </form>
  );
}
