import { LinkButton } from "@/components/ui/button";
import { EmptyState } from "@/components/ui/states";

/** What to do when the Horizon shows no pack. */
export function NothingDue({ narrowed }: { narrowed: boolean }) {
  return (
    <EmptyState
      title="No pack reaches cut-off here."
      action={
        narrowed ? (
          <LinkButton href="/horizon?within=all">Show all packs</LinkButton>
        ) : (
          <LinkButton href="/import">Import assets and readings</LinkButton>
        )
      }
    >
      {narrowed
        ? "Widen the days or take a filter off."
        : "Nothing in service is due in the next 90 days, or no pack has been entered yet."}
    </EmptyState>
  );
}
