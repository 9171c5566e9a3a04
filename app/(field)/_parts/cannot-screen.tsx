"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { TextArea, TextInput } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";
import { EmptyState } from "@/components/ui/states";
import { fieldStore } from "@/lib/offline/browser-store";
import { findStop } from "@/lib/offline/day";
import type { CannotReason } from "@/lib/sync/entries";
import { stopTitle } from "./day-view";
import { FieldChoice } from "./field-chip";
import { CANNOT_WORDS } from "./field-words";
import { go } from "./go";
import { PhotoField } from "./photo-field";
import type { ScreenProps } from "./screen";
import { usePictures } from "./use-pictures";

const OPTIONS = Object.entries(CANNOT_WORDS) as [CannotReason, string][];

/** Why a stop cannot be done today, and when to come back: it feeds the next plan. */
export function CannotScreen({ day, query }: ScreenProps) {
  const stop = findStop(day, query.get("stop"));
  const [reason, setReason] = useState<CannotReason | null>(null);
  const [note, setNote] = useState("");
  const [returnOn, setReturnOn] = useState("");
  const pictures = usePictures();
  const [trouble, setTrouble] = useState<string | null>(null);
  const back = { href: stop ? `/stop?id=${stop.id}` : "/today", label: "Back to the stop" };
  if (!stop) {
    return (
      <>
        <FieldBar title="Can’t do it today" heading back={back} />
        <FieldPage>
          <EmptyState title="This stop is not on this phone." />
        </FieldPage>
      </>
    );
  }
  const keep = async () => {
    if (!reason) return setTrouble("Choose the reason first.");
    const { id: stopId } = stop;
    const fault = await fieldStore().keepSeen(
      { kind: "cannot", stopId, reason, returnOn: returnOn || null, note: note.trim() },
      pictures.list,
    );
    if (fault) setTrouble(fault);
    else go("/today", true);
  };
  return (
    <>
      <FieldBar title="Can’t do it today" heading back={back} />
      <FieldPage
        foot={
          <BigButton kind="go" disabled={pictures.busy} onClick={() => void keep()}>
            Keep this
          </BigButton>
        }
      >
        <p className="font-semibold">{stopTitle(day, stop)}</p>
        {trouble && <Notice kind="trouble">{trouble}</Notice>}
        <FieldChoice label="Reason" options={OPTIONS} value={reason} onChange={setReason} />
        <TextInput
          name="returnOn"
          label="Come back on"
          type="date"
          optional
          value={returnOn}
          onChange={(event) => setReturnOn(event.target.value)}
        />
        <TextArea
          name="note"
          label="Note for the office"
          optional
          rows={3}
          maxLength={1000}
          value={note}
          onChange={(event) => setNote(event.target.value)}
        />
        <PhotoField pictures={pictures} />
      </FieldPage>
    </>
  );
}
