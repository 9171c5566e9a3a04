import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/states";

/** What a technician sees who comes to an office page. */
export function FieldOnly() {
  return (
    <EmptyState
      title="This page belongs to the office."
      action={
        <LinkButton href="/today" kind="go">
          Go to today’s round
        </LinkButton>
      }
    >
      Your role is technician. An administrator can give you another one.
    </EmptyState>
  );
}
