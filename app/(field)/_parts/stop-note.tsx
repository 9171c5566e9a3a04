"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { TextArea } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";
import { fieldStore } from "@/lib/offline/browser-store";
import { PhotoField } from "./photo-field";
import { usePictures } from "./use-pictures";

/** Something seen at a stop, for the office: words, photos, or both. */
export function StopNote({ stopId }: { stopId: string }) {
  const [open, setOpen] = useState(false);
  const [text, setText] = useState("");
  const [trouble, setTrouble] = useState<string | null>(null);
  const [kept, setKept] = useState(false);
  const pictures = usePictures();
  const keep = async () => {
    const said = text.trim();
    if (!said && pictures.list.length === 0) {
      return setTrouble("Write something, or take a photo first.");
    }
    const fault = await fieldStore().keepSeen({ kind: "note", stopId, text: said }, pictures.list);
    setTrouble(fault);
    if (fault) return;
    setText("");
    pictures.clear();
    setOpen(false);
    setKept(true);
  };
  if (!open) {
    return (
      <>
        {kept && <Notice kind="done">Kept for the office.</Notice>}
        <BigButton onClick={() => setOpen(true)}>Note or photo</BigButton>
      </>
    );
  }
  return (
    <div className="flex flex-col gap-3">
      {trouble && <Notice kind="trouble">{trouble}</Notice>}
      <TextArea
        {...{ name: "seen", label: "What you see here", optional: true, rows: 3, maxLength: 1000 }}
        value={text}
        onChange={(event) => setText(event.target.value)}
      />
      <PhotoField pictures={pictures} />
      <BigButton kind="go" disabled={pictures.busy} onClick={() => void keep()}>
        Keep for the office
      </BigButton>
      <BigButton onClick={() => setOpen(false)}>Not now</BigButton>
    </div>
  );
}
