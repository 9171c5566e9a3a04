"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { Notice } from "@/components/ui/notice";
import { fieldStore } from "@/lib/offline/browser-store";
import type { FieldSnapshot } from "@/lib/offline/field-store";
import { heldBy, withDependents } from "@/lib/offline/outbox-view";
import type { OutboxEntry } from "@/lib/sync/outbox";
import { entryTitle, entryWhen, stateWords } from "./entry-words";

/** One entry: what it was, what became of it, and what can be done about it. */
export function OutboxItem({ entry, field }: { entry: OutboxEntry; field: FieldSnapshot }) {
  const held = heldBy(field.entries, entry);
  return (
    <div className="flex flex-col gap-2 px-4 py-3">
      <p>
        <span className="block font-semibold">{entryTitle(entry, field.day)}</span>
        <span className="block text-soft">
          {entryWhen(entry, field.day)} · {stateWords(entry, held !== null)}
        </span>
      </p>
      {entry.refusal && entry.state !== "applied" && (
        <p className={entry.state === "refused" ? "text-brick-ink" : "text-soft"}>
          {entry.refusal.message}
        </p>
      )}
      {entry.state === "refused" && <Mending entry={entry} field={field} />}
    </div>
  );
}

function Mending({ entry, field }: { entry: OutboxEntry; field: FieldSnapshot }) {
  const [asked, setAsked] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const { body } = entry;
  const store = fieldStore();
  const more = withDependents(field.entries, entry).length - 1;
  const discard = async () => {
    if (!asked) return setAsked(true);
    setTrouble(await store.discard(entry.id));
  };
  return (
    <div className="flex flex-col gap-2.5">
      {trouble && <Notice kind="trouble">{trouble}</Notice>}
      {body.kind === "swap" && (
        <BigButton href={`/swap?asset=${body.assetId}&mend=${entry.id}`}>Mend it</BigButton>
      )}
      {body.kind === "reading" && (
        <BigButton href={`/log?asset=${body.assetId}`}>Measure anew</BigButton>
      )}
      <BigButton onClick={() => void store.mend(entry, body).then(setTrouble)}>
        Send it again as it is
      </BigButton>
      <BigButton kind="danger" onClick={() => void discard()}>
        {asked
          ? `Discard for good${more > 0 ? `, with ${more} that rest on it` : ""}`
          : "Discard it"}
      </BigButton>
    </div>
  );
}
