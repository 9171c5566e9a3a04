import { Button, LinkButton } from "@/components/ui/button";
import { TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import { actLabel } from "@/lib/present/act-label";
import type { AuditView } from "@/lib/usecases/list-audit";

/** Filters in the address; works without script. */
export function AuditFilter({ view }: { view: AuditView }) {
  const { given, acts, people } = view;
  return (
    <form action="/settings/audit" className="mb-3 flex flex-wrap items-end gap-3">
      <Select
        name="person"
        label="Who"
        required={false}
        placeholder="Everybody"
        defaultValue={given.personId ?? ""}
        options={people.map(({ id, name }) => ({ value: id, label: name }))}
      />
      <Select
        name="act"
        label="What"
        required={false}
        placeholder="Everything"
        defaultValue={given.act ?? ""}
        options={acts.map((act) => ({ value: act, label: actLabel(act) }))}
      />
      <TextInput
        name="from"
        label="From"
        required={false}
        type="date"
        key={`from-${given.fromDay}`}
        defaultValue={given.fromDay ?? ""}
      />
      <TextInput
        name="to"
        label="To"
        required={false}
        type="date"
        key={`to-${given.toDay}`}
        defaultValue={given.toDay ?? ""}
      />
      <Button type="submit">Show</Button>
      <LinkButton href="/settings/audit" kind="quiet">
        All entries
      </LinkButton>
    </form>
  );
}
