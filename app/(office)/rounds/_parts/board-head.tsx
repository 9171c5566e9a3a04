"use client";

import { useState } from "react";
import { Button, LinkButton } from "@/components/ui/button";
import { ChipLink } from "@/components/ui/chip-link";
import { Notice } from "@/components/ui/notice";
import { AbsenceDialog } from "./absence-dialog";
import { BuildDialog } from "./build-dialog";
import type { BoardActs } from "./use-board";
import { weekAfter } from "./week-after";

const STATES: Record<string, string> = {
  building: "being built",
  draft: "draft: nothing is sent yet",
  published: "published",
  failed: "not built",
};

/** Which week and plan is shown, and the acts that begin something. */
export function BoardHead({ acts, crewId }: { acts: BoardActs; crewId: string | null }) {
  const { board, busy, discard, revise } = acts;
  const { plan, plans, monday, mayEdit } = board;
  const [open, setOpen] = useState<"build" | "absence" | null>(null);
  const weekHref = (weeks: number) =>
    `/rounds?week=${weekAfter(monday, weeks)}${crewId ? `&crew=${crewId}` : ""}`;
  const others = plans.filter((other) => other.id !== plan?.id);
  return (
    <div className="mb-3 flex flex-wrap items-center gap-x-3 gap-y-2">
      <h1 className="text-2xl first-letter:uppercase">{board.weekLabel}</h1>
      <span className="text-soft">{plan ? planWords(plan) : "nothing planned yet"}</span>
      <nav aria-label="Week" className="flex gap-1.5">
        <LinkButton href={weekHref(-1)} kind="quiet">
          ← Week before
        </LinkButton>
        <LinkButton href={weekHref(1)} kind="quiet">
          Week after →
        </LinkButton>
      </nav>
      <ChipLink href="/rounds/field" count={board.matters}>
        From the field
      </ChipLink>
      {others.map((other) => (
        <span key={other.id} className="inline-flex flex-wrap items-center gap-1.5">
          <ChipLink href={`/rounds?week=${monday}&plan=${other.id}`}>
            {other.name}, {STATES[other.state] ?? other.state}
          </ChipLink>
          {plan && (
            <LinkButton href={`/rounds/compare?plan=${other.id}&with=${plan.id}`} kind="quiet">
              Compare<span className="sr-only"> with {other.name}</span>
            </LinkButton>
          )}
        </span>
      ))}
      {mayEdit && (
        <div className="ml-auto flex flex-wrap gap-2">
          <Button onClick={() => setOpen("absence")}>Somebody is away</Button>
          {plan && plan.state !== "published" && (
            <Button kind="danger" onClick={() => discard.mutate()} disabled={busy}>
              {plan.state === "building" ? "Stop and discard" : "Discard draft"}
            </Button>
          )}
          {plan?.state === "published" && board.rounds.some((r) => r.state === "published") && (
            <Button onClick={() => revise.mutate()} disabled={busy}>
              Change published rounds
            </Button>
          )}
          <Button kind={plan ? "plain" : "go"} onClick={() => setOpen("build")}>
            Build rounds
          </Button>
        </div>
      )}
      {open === "build" && <BuildDialog acts={acts} onClose={() => setOpen(null)} />}
      {open === "absence" && <AbsenceDialog acts={acts} onClose={() => setOpen(null)} />}
      {!plan && board.rounds.length === 0 && (
        <div className="basis-full">
          <Notice>
            No rounds in this week. {mayEdit ? "Build them to see who could go where." : ""}
          </Notice>
        </div>
      )}
    </div>
  );
}

/** The plan's name only where it says more than the heading. */
function planWords(plan: { readonly name: string; readonly state: string }): string {
  const state = STATES[plan.state] ?? plan.state;
  return /^Week \d+$/.test(plan.name) ? state : `${plan.name} · ${state}`;
}
