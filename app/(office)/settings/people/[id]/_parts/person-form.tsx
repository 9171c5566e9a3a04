"use client";

import { ActionForm } from "@/components/forms/action-form";
import { changePersonAction } from "../../actions";
import { PersonEntries } from "../../_parts/person-entries";

export interface PersonFormProps {
  person: { id: string; name: string; email: string; roles: readonly string[] };
}

/** Changes name, address and roles; roles hold from the next request. */
export function PersonForm({ person }: PersonFormProps) {
  return (
    <ActionForm action={changePersonAction} submit="Save" done={`${person.name} is saved.`}>
      {(entries) => (
        <>
          <input type="hidden" name="id" value={person.id} />
          <PersonEntries entries={entries} stored={person} />
        </>
      )}
    </ActionForm>
  );
}
