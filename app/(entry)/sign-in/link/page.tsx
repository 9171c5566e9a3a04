import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { visitor } from "@/lib/server/session";
import { readLink } from "@/lib/usecases/read-link";
import { DeadLink } from "../../_parts/dead-link";
import { EntryHead } from "../../_parts/entry-head";
import { LinkForm } from "./_parts/link-form";

export const metadata: Metadata = { title: "Sign in" };

type Search = Promise<{ token?: string }>;

/** A button rather than an immediate sign-in: programs that look through mails open links too. */
export default async function LinkPage({ searchParams }: { searchParams: Search }) {
  const token = String((await searchParams).token ?? "");
  const owner = await readLink(deps(), await visitor(), { token, purpose: "sign_in" });
  if (!owner) return <DeadLink again={{ href: "/sign-in/by-mail", label: "Send a new link" }} />;
  return (
    <>
      <EntryHead title={`Hello ${owner.name}`}>You sign in as {owner.email}.</EntryHead>
      <LinkForm token={token} />
    </>
  );
}
