import type { Metadata } from "next";
import { EntryHead } from "../../_parts/entry-head";
import { MailForm } from "../../_parts/mail-form";
import { requestSignInLinkAction } from "./actions";

export const metadata: Metadata = { title: "Sign in by a mail link" };

export default function ByMailPage() {
  return (
    <>
      <EntryHead title="Sign in by a mail link">
        We send a link to your mail address. Open it on the device on which you want to sign in.
      </EntryHead>
      <MailForm action={requestSignInLinkAction} submit="Send the link" worksFor="15 minutes" />
    </>
  );
}
