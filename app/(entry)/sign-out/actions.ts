"use server";

import { redirect } from "next/navigation";
import { signOut as dropCookie } from "@/lib/server/auth";
import { deps } from "@/lib/server/deps";
import { currentActor } from "@/lib/server/session";
import { signOut } from "@/lib/usecases/sign-out";

/** Signs out on this device: `<form action={signOutAction}>`. */
export async function signOutAction(): Promise<void> {
  const actor = await currentActor();
  if (actor) await signOut(deps(), actor, {});
  await dropCookie({ redirect: false });
  // The page there takes the day off this phone.
  redirect("/sign-in?left=1");
}
