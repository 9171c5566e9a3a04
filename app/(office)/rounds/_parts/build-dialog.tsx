"use client";

import { useMutation } from "@tanstack/react-query";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Dialog } from "@/components/ui/dialog";
import { Checkbox } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";
import { Select } from "@/components/ui/select";
import { fetchJson } from "../../_parts/fetch-json";
import type { BoardActs } from "./use-board";
import { weekAfter } from "./week-after";

/** Choose the weeks and crews, and let the worker build. */
export function BuildDialog({ acts, onClose }: { acts: BoardActs; onClose: () => void }) {
  const { board, goTo } = acts;
  const next = board.monday < board.today ? weekAfter(board.monday, 1) : board.monday;
  const [week, setWeek] = useState(next);
  const [weeks, setWeeks] = useState("1");
  const [crews, setCrews] = useState(board.crews.map((crew) => crew.id));
  const build = useMutation({
    mutationFn: () =>
      fetchJson<{ planId: string }>("/api/v1/plans", {
        method: "POST",
        body: { week, weeks, crewIds: crews.length === board.crews.length ? [] : crews },
      }),
    onSuccess: (made) => {
      onClose();
      goTo(made.planId, week);
    },
  });
  const from = board.monday < board.today ? board.monday : weekAfter(board.monday, -1);
  const choices = Array.from({ length: 8 }, (_, i) => weekAfter(from, i));
  return (
    <Dialog
      open
      title="Build rounds"
      onClose={onClose}
      actions={
        <>
          <Button onClick={onClose}>Not now</Button>
          <Button
            kind="go"
            busy={build.isPending && "Starting…"}
            disabled={crews.length === 0}
            onClick={() => build.mutate()}
          >
            Build
          </Button>
        </>
      }
    >
      {build.error && <Notice kind="trouble">{build.error.message}</Notice>}
      <div className="flex flex-col gap-4">
        <Select
          name="week"
          label="First week"
          value={week}
          onChange={(event) => setWeek(event.target.value)}
          options={choices.map((day) => ({ value: day, label: `from Monday ${day}` }))}
        />
        <Select
          name="weeks"
          label="How far ahead"
          value={weeks}
          onChange={(event) => setWeeks(event.target.value)}
          options={["1", "2", "3", "4"].map((n) => ({
            value: n,
            label: n === "1" ? "1 week" : `${n} weeks`,
          }))}
        />
        <fieldset className="flex flex-col gap-1">
          <legend className="caps mb-1">Crews</legend>
          {board.crews.map((crew) => (
            <Checkbox
              key={crew.id}
              name={`crew-${crew.id}`}
              label={crew.name}
              checked={crews.includes(crew.id)}
              onChange={(event) =>
                setCrews(
                  event.target.checked ? [...crews, crew.id] : crews.filter((id) => id !== crew.id),
                )
              }
            />
          ))}
        </fieldset>
        <p className="text-soft">
          A draft is made. Rounds already published in these weeks are where it starts from; nothing
          is sent to anybody until you publish.
        </p>
      </div>
    </Dialog>
  );
}
