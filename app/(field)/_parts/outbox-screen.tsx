"use client";

import { FieldBar } from "@/components/ui/field-bar";
import { FieldPage } from "@/components/ui/field-page";
import { EmptyState } from "@/components/ui/states";
import type { FieldSnapshot } from "@/lib/offline/field-store";
import { fieldStatus } from "./field-status";
import { OutboxItem } from "./outbox-item";
import { OutboxNotices } from "./outbox-notices";
import { PhotoItems } from "./photo-items";

/** Every entry on this phone with its state; refused ones with their reason and a way on. */
export function OutboxScreen({ field }: { field: FieldSnapshot }) {
  const own = field.entries.filter((entry) => entry.personId === field.person?.id);
  const order = { refused: 0, sending: 1, kept: 1, applied: 2 };
  const sorted = [...own].sort((a, b) => order[a.state] - order[b.state] || b.seq - a.seq);
  return (
    <>
      <FieldBar
        title="Kept on this phone"
        heading
        back={{ href: "/today", label: "Back to the round" }}
        status={fieldStatus(field)}
      />
      <FieldPage>
        <OutboxNotices field={{ ...field, count: { ...field.count, refused: 0 } }} />
        <PhotoItems field={field} />
        {sorted.length === 0 && field.count.photos === 0 ? (
          <EmptyState title="Everything has been sent.">
            Entries stand here from the moment you keep them until the office has them.
          </EmptyState>
        ) : (
          <ul aria-label="Entries" className="-mx-4 border-y border-rule bg-sheet">
            {sorted.map((entry) => (
              <li key={entry.id} className="border-t border-rule first:border-t-0">
                <OutboxItem {...{ entry, field }} />
              </li>
            ))}
          </ul>
        )}
      </FieldPage>
    </>
  );
}
