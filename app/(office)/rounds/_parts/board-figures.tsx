"use client";

import { Button } from "@/components/ui/button";
import { Figure, FigureRow } from "@/components/ui/figure";
import { useState } from "react";
import { PublishDialog } from "./publish-dialog";
import type { BoardActs } from "./use-board";

/** What the plan does and costs, and the acts on the whole of it. */
export function BoardFigures({ acts }: { acts: BoardActs }) {
  const { board, busy } = acts;
  const [publishing, setPublishing] = useState(false);
  const { plan, figures, mayEdit } = board;
  if (!plan || figures.length === 0) return null;
  const draft = plan.state === "draft";
  return (
    <>
      <FigureRow
        actions={
          mayEdit &&
          draft && (
            <>
              {plan.undo && (
                <Button onClick={acts.undo} disabled={busy} title={`Undo ${plan.undo}`}>
                  Undo
                </Button>
              )}
              <Button onClick={acts.improve} disabled={busy}>
                Improve
              </Button>
              <Button kind="go" onClick={() => setPublishing(true)} disabled={busy}>
                {plan.roundCount === 1 ? "Publish 1 round" : `Publish ${plan.roundCount} rounds`}
              </Button>
            </>
          )
        }
      >
        {figures.map((figure) => (
          <Figure
            key={figure.label}
            label={figure.label}
            value={figure.value}
            range={figure.range}
            {...(figure.quiet && { tone: "quiet" as const })}
          />
        ))}
      </FigureRow>
      {publishing && <PublishDialog acts={acts} onClose={() => setPublishing(false)} />}
    </>
  );
}
