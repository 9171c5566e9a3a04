import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { visitor } from "@/lib/server/session";
import { readLink } from "@/lib/usecases/read-link";
import { DeadLink } from "../../_parts/dead-link";
import { EntryHead } from "../../_parts/entry-head";
import { ChoosePasswordForm } from "./_parts/choose-password-form";

export const metadata: Metadata = { title: "Choose a new password" };

type Search = Promise<{ token?: string }>;

export default async function ChoosePage({ searchParams }: { searchParams: Search }) {
  const token = String((await searchParams).token ?? "");
  const owner = await readLink(deps(), await visitor(), { token, purpose: "password" });
  if (!owner) return <DeadLink again={{ href: "/forgotten", label: "Send a new link" }} />;
  return (
    <>
      <EntryHead title="Choose a new password">
        For {owner.email}. You will be signed out everywhere else.
      </EntryHead>
      <ChoosePasswordForm token={token} email={owner.email} />
    </>
  );
}
