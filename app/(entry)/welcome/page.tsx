import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { visitor } from "@/lib/server/session";
import { readLink } from "@/lib/usecases/read-link";
import { DeadLink } from "../_parts/dead-link";
import { EntryHead } from "../_parts/entry-head";
import { WelcomeForm } from "./_parts/welcome-form";

export const metadata: Metadata = { title: "Welcome" };

type Search = Promise<{ token?: string }>;

export default async function WelcomePage({ searchParams }: { searchParams: Search }) {
  const token = String((await searchParams).token ?? "");
  const owner = await readLink(deps(), await visitor(), { token, purpose: "invitation" });
  if (!owner) return <DeadLink again={null} />;
  return (
    <>
      <EntryHead title="Welcome">
        You sign in as {owner.email}. Check your name and choose a password.
      </EntryHead>
      <WelcomeForm token={token} name={owner.name} email={owner.email} />
    </>
  );
}
