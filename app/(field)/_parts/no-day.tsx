"use client";

import { BigButton } from "@/components/ui/big-button";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { EmptyState, ErrorPanel, Skeleton } from "@/components/ui/states";
import { fieldStore } from "@/lib/offline/browser-store";
import type { FieldSnapshot } from "@/lib/offline/field-store";
import { fieldStatus } from "./field-status";

/** Before the first load, or when the phone cannot keep anything. */
export function NoDay({ field }: { field: FieldSnapshot }) {
  const again = <BigButton onClick={() => void fieldStore().exchange()}>Try again</BigButton>;
  return (
    <>
      <FieldBar title="Today’s round" heading status={fieldStatus(field)} />
      <FieldPage>
        {field.phase === "no-store" ? (
          <ErrorPanel
            title="This browser keeps nothing on the phone"
            todo="Leave private browsing, or allow this site to store data, then open the page again. Without that nothing entered here would be safe."
          />
        ) : field.signedOut ? (
          <EmptyState
            title="Your sign-in has run out."
            action={<BigButton href="/sign-in?from=/today">Sign in</BigButton>}
          >
            Sign in to load your rounds. Entries kept on this phone stay.
          </EmptyState>
        ) : field.busy ? (
          <Skeleton label="Loading your rounds" shape="lines" rows={8} />
        ) : (
          <EmptyState title="No rounds on this phone yet." action={again}>
            Load them once where there is signal; after that they work anywhere.
          </EmptyState>
        )}
      </FieldPage>
    </>
  );
}
