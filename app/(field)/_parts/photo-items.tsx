"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { fieldStore } from "@/lib/offline/browser-store";
import type { FieldSnapshot } from "@/lib/offline/field-store";

/** The photos that are still on this phone: how many wait, and those that will never be taken. */
export function PhotoItems({ field }: { field: FieldSnapshot }) {
  const own = field.photos.filter((photo) => photo.personId === field.person?.id);
  const refused = own.filter((photo) => photo.refusal !== null);
  const waiting = own.length - refused.length;
  return (
    <>
      {waiting > 0 && (
        <p>
          {waiting === 1 ? "1 photo waits" : `${waiting} photos wait`} to be sent after{" "}
          {waiting === 1 ? "its entry" : "their entries"}.
        </p>
      )}
      {refused.map((photo) => (
        <RefusedPhoto key={photo.id} id={photo.id} why={photo.refusal?.message ?? ""} />
      ))}
    </>
  );
}

function RefusedPhoto({ id, why }: { id: string; why: string }) {
  const [asked, setAsked] = useState(false);
  const discard = () => (asked ? void fieldStore().discardPhoto(id) : setAsked(true));
  return (
    <div className="flex flex-col gap-2 border-t border-rule pt-3">
      <p>
        <span className="block font-semibold">A photo was refused</span>
        <span className="text-brick-ink">{why}</span>
      </p>
      <BigButton kind="danger" onClick={discard}>
        {asked ? "Discard the photo for good" : "Discard the photo"}
      </BigButton>
    </div>
  );
}
