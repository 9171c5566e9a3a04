import type { Metadata } from "next";
import { EntryHead } from "../_parts/entry-head";
import { MailForm } from "../_parts/mail-form";
import { requestPasswordLinkAction } from "./actions";

export const metadata: Metadata = { title: "Password forgotten" };

export default function ForgottenPage() {
  return (
    <>
      <EntryHead title="Password forgotten">
        We send a link to your mail address, with which you choose a new password.
      </EntryHead>
      <MailForm action={requestPasswordLinkAction} submit="Send the link" worksFor="one hour" />
    </>
  );
}
