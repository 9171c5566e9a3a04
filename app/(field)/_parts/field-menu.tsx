"use client";

import { useState } from "react";
import { BigButton } from "@/components/ui/big-button";
import { fieldStore } from "@/lib/offline/browser-store";
import type { FieldSnapshot } from "@/lib/offline/field-store";
import { forgetShell } from "@/lib/offline/shell";
import { formatInstant } from "@/lib/present/format-time";
import type { DayPack } from "@/lib/sync/day-pack";
import { signOutAction } from "../../(entry)/sign-out/actions";
import { afterNight, keepNight, keptNight, type Night, NIGHT_WORDS } from "./night";

/** What is kept, night colours, signing out: below the day's work. */
export function FieldMenu({ field, day }: { field: FieldSnapshot; day: DayPack }) {
  const [asked, setAsked] = useState(false);
  const { count } = field;
  const leave = async () => {
    if (count.toSend > 0 && !asked) return setAsked(true);
    await fieldStore().forget();
    await forgetShell();
    await signOutAction();
  };
  return (
    <div className="mt-2 flex flex-col gap-2.5 border-t border-rule pt-4">
      <BigButton href="/outbox" aside={count.toSend + count.refused || "none"}>
        Kept on this phone
      </BigButton>
      <NightButton />
      <BigButton onClick={() => void fieldStore().exchange()} disabled={field.busy}>
        {field.busy ? "Calling…" : "Load again"}
      </BigButton>
      <BigButton onClick={() => void leave()}>
        {asked
          ? `Sign out all the same: ${count.toSend} kept here until you sign in again`
          : `Sign out ${day.person.name}`}
      </BigButton>
      <p className="text-soft">
        Loaded {formatInstant(new Date(day.madeAt), day.organisation, { year: false })}.
      </p>
    </div>
  );
}

function NightButton() {
  const [night, setNight] = useState<Night>(keptNight);
  const press = () => {
    keepNight(afterNight[night]);
    setNight(afterNight[night]);
  };
  return (
    <BigButton aside={NIGHT_WORDS[night]} onClick={press}>
      Night colours
    </BigButton>
  );
}
