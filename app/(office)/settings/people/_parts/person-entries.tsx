import type { Entries } from "@/components/forms/action-form";
import { Checkbox, TextInput } from "@/components/ui/inputs";

const ROLES = [
  { role: "administrator", does: "everything, and Settings" },
  { role: "dispatcher", does: "the register, plans and rounds" },
  { role: "supervisor", does: "reads everything in the office, digests, the record" },
  { role: "technician", does: "the phone pages: own rounds, voltages, swaps" },
] as const;

export interface PersonEntriesProps {
  entries: Entries;
  stored?: { name: string; email: string; roles: readonly string[] };
}

/** Name, mail address and roles of a person. */
export function PersonEntries({ entries, stored }: PersonEntriesProps) {
  const fault = entries.fault("roles");
  return (
    <>
      <TextInput
        label="Name"
        maxLength={120}
        autoComplete="off"
        {...entries.text("name", stored?.name)}
      />
      <TextInput
        label="Mail address"
        type="email"
        maxLength={254}
        autoComplete="off"
        {...entries.text("email", stored?.email)}
      />
      <fieldset>
        <legend className="mb-1 font-medium">Roles</legend>
        {ROLES.map(({ role, does }) => {
          const { key, ...tick } = entries.tick(
            `role-${role}`,
            stored?.roles.includes(role) ?? false,
          );
          const label = role.charAt(0).toUpperCase() + role.slice(1);
          return <Checkbox key={key} {...tick} label={label} hint={does} />;
        })}
        {fault && <p className="text-sm font-medium text-brick-ink">{fault}</p>}
      </fieldset>
    </>
  );
}
