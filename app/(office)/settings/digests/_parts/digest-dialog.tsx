"use client";

import { ActionForm } from "@/components/forms/action-form";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { EditDialog } from "../../_parts/edit-dialog";
import { WeekdayTicks } from "../../_parts/weekday-ticks";
import { chooseDigestAction } from "../actions";

export interface DigestDialogProps {
  row: {
    personId: string;
    name: string;
    weekdays: readonly number[] | null;
    sendAt: string | null;
    horizonDays: number | null;
  };
  locale: string;
}

/** Weekdays, hour and horizon of one person's digest. */
export function DigestDialog({ row, locale }: DigestDialogProps) {
  return (
    <EditDialog label="Change" name={`Change the digest of ${row.name}`} title={row.name}>
      {(close) => (
        <ActionForm action={chooseDigestAction} submit="Save" done="Saved." onDone={close}>
          {(entries) => (
            <>
              <input type="hidden" name="id" value={row.personId} />
              <WeekdayTicks
                legend="Sent on"
                hint="No day: no digest."
                entries={entries}
                stored={row.weekdays ?? []}
                locale={locale}
              />
              <TextInput
                label="From"
                hint="Local time; it goes out within some minutes."
                type="time"
                {...entries.text("sendAt", row.sendAt?.slice(0, 5) ?? "07:00")}
              />
              <NumberInput
                label="Looks ahead"
                unit="days"
                {...entries.text("horizonDays", row.horizonDays ?? 14)}
              />
            </>
          )}
        </ActionForm>
      )}
    </EditDialog>
  );
}
