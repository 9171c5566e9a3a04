"use client";

import { Button, LinkButton } from "@/components/ui/button";

/** Back to the board, or on to paper. */
export function PrintButton({ back }: { back: string }) {
  return (
    <div className="mb-4 flex gap-2 no-print">
      <LinkButton href={back}>Back to the rounds</LinkButton>
      <Button kind="go" onClick={() => window.print()}>
        Print on one A4
      </Button>
    </div>
  );
}
