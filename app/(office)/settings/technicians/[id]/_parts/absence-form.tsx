"use client";

import Link from "next/link";
import { useState } from "react";
import { ActionForm } from "@/components/forms/action-form";
import { TextInput } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";
import { recordAbsenceAction } from "../actions";

/** Records days off; says when rounds already stand on them. */
export function AbsenceForm({ technicianId, today }: { technicianId: string; today: string }) {
  const [affected, setAffected] = useState(0);
  return (
    <div className="border-t border-rule px-3 py-4">
      {affected > 0 && (
        <Notice
          kind="warn"
          action={
            <Link className="textlink" href="/rounds">
              Go to Rounds
            </Link>
          }
        >
          {affected === 1 ? "A round stands" : `${affected} rounds stand`} on these days and must be
          rearranged.
        </Notice>
      )}
      <ActionForm
        action={recordAbsenceAction}
        submit="Record the absence"
        done="The absence is recorded."
        onDone={({ roundsAffected }) => setAffected(roundsAffected)}
        kind="plain"
      >
        {(entries) => (
          <div className="grid gap-4 sm:grid-cols-3">
            <input type="hidden" name="technicianId" value={technicianId} />
            <TextInput label="First day" type="date" {...entries.text("firstDay", today)} />
            <TextInput label="Last day" type="date" {...entries.text("lastDay", today)} />
            <TextInput label="Reason" optional maxLength={200} {...entries.text("reason")} />
          </div>
        )}
      </ActionForm>
    </div>
  );
}
