import type { Metadata } from "next";
import Link from "next/link";
import { Notice } from "@/components/ui/notice";
import { roleNames } from "@/lib/present/role-names";
import { requireActor } from "@/lib/server/session";
import { EntryHead } from "../_parts/entry-head";
import { EverywhereForm } from "./_parts/everywhere-form";
import { PasswordForm } from "./_parts/password-form";

export const metadata: Metadata = { title: "Your account" };

type Search = Promise<{ changed?: string }>;

export default async function AccountPage({ searchParams }: { searchParams: Search }) {
  const actor = await requireActor();
  const { changed } = await searchParams;
  return (
    <>
      <EntryHead title="Your account">
        {actor.name}, {actor.email}. {roleNames(actor.roles)}.
      </EntryHead>
      {changed && (
        <Notice kind="done">Your password is changed; other devices are signed out.</Notice>
      )}
      <h2 className="mt-2 mb-3 text-lg">Change your password</h2>
      <PasswordForm email={actor.email} />
      <h2 className="mt-8 mb-1 border-t border-rule pt-4 text-lg">Lost a phone?</h2>
      <p className="mb-3 text-soft">
        This ends your sign-in on every device, this one too. What a phone has not sent yet stays on
        it until you sign in there again.
      </p>
      <EverywhereForm personId={actor.personId} />
      <p className="mt-6">
        <Link className="textlink inline-flex min-h-11 items-center" href="/">
          Back to your work
        </Link>
      </p>
    </>
  );
}
