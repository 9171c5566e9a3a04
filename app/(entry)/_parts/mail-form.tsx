"use client";

import Link from "next/link";
import { useState } from "react";
import { ActionForm, type FormAction } from "@/components/forms/action-form";
import { TextInput } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";

export interface MailFormProps {
  action: FormAction<{ email: string }>;
  submit: string;
  /** How long the link works: "15 minutes". */
  worksFor: string;
}

/** Asks for a mail address and says the same whether or not anybody has it. */
export function MailForm({ action, submit, worksFor }: MailFormProps) {
  const [sentTo, setSentTo] = useState<string | null>(null);
  return (
    <>
      {sentTo && (
        <Notice kind="done" word="On its way">
          If somebody signs in here as {sentTo}, a link is on its way there. It works once, for{" "}
          {worksFor}.
        </Notice>
      )}
      <ActionForm
        action={action}
        submit={sentTo ? "Send another" : submit}
        busy="Sending…"
        kind={sentTo ? "plain" : "go"}
        onDone={({ email }) => setSentTo(email)}
        tall
      >
        {(entries) => (
          <TextInput
            label="Mail address"
            type="email"
            autoComplete="username"
            maxLength={254}
            {...entries.text("email", sentTo)}
          />
        )}
      </ActionForm>
      <p className="mt-5">
        <Link className="textlink inline-flex min-h-11 items-center" href="/sign-in">
          Back to signing in
        </Link>
      </p>
    </>
  );
}
