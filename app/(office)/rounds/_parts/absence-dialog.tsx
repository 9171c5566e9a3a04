"use client";

import { useMutation } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { TextInput } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";
import { Select } from "@/components/ui/select";
import { toast } from "@/components/ui/toast";
import { fetchJson } from "../../_parts/fetch-json";
import type { BoardActs } from "./use-board";

interface Outcome {
  readonly roundsLeftOpen: number;
  readonly planId: string | null;
}

/** Somebody is ill or away: one act, and a draft in which the others take over. */
export function AbsenceDialog({ acts, onClose }: { acts: BoardActs; onClose: () => void }) {
  const { board } = acts;
  const router = useRouter();
  const [technicianId, setTechnician] = useState(board.rows[0]?.technicianId ?? "");
  const [firstDay, setFirst] = useState(board.today);
  const [lastDay, setLast] = useState(board.today);
  const [reason, setReason] = useState("ill");
  const mark = useMutation({
    mutationFn: () =>
      fetchJson<Outcome>("/api/v1/rounds/absences", {
        method: "POST",
        body: { technicianId, firstDay, lastDay, reason },
      }),
    onSuccess: ({ roundsLeftOpen, planId }) => {
      onClose();
      toast({
        text:
          roundsLeftOpen === 0
            ? "Noted. No published round is touched."
            : `Noted. A draft shares ${roundsLeftOpen === 1 ? "the round" : `${roundsLeftOpen} rounds`} out; nothing is sent yet.`,
      });
      if (planId) router.push(`/rounds?week=${firstDay}&plan=${planId}`);
      else void acts.again();
    },
  });
  return (
    <Dialog
      open
      title="Somebody is away"
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Not now</Button>
          <Button kind="go" busy={mark.isPending && "Noting…"} onClick={() => mark.mutate()}>
            Note it
          </Button>
        </>
      }
    >
      {mark.error && <Notice kind="trouble">{mark.error.message}</Notice>}
      <div className="grid gap-4 sm:grid-cols-2">
        <Select
          name="technician"
          label="Who"
          value={technicianId}
          onChange={(event) => setTechnician(event.target.value)}
          options={board.rows.map((row) => ({ value: row.technicianId, label: row.name }))}
        />
        <TextInput
          name="reason"
          label="Why"
          optional
          value={reason}
          onChange={(event) => setReason(event.target.value)}
        />
        <TextInput
          name="firstDay"
          label="First day"
          type="date"
          value={firstDay}
          onChange={(event) => setFirst(event.target.value)}
        />
        <TextInput
          name="lastDay"
          label="Last day"
          type="date"
          value={lastDay}
          onChange={(event) => setLast(event.target.value)}
        />
      </div>
      <p className="mt-3 text-soft">
        Published rounds on these days go to the others in a draft, with their own days kept. Nobody
        is told before you publish it.
      </p>
    </Dialog>
  );
}
