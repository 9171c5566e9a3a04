import { type Column, DataTable } from "@/components/ui/data-table";
import { PageHead } from "@/components/ui/page-head";
import { EmptyState } from "@/components/ui/states";
import { formatInstant } from "@/lib/present/format-time";
import { NOTHING, type Presentation } from "@/lib/present/locale";
import type { ApiKeyRow } from "@/lib/usecases/list-api-keys";
import { NewKey } from "./new-key";
import { RevokeKey } from "./revoke-key";

export interface ApiKeysPageProps {
  keys: readonly ApiKeyRow[];
  organisation: Presentation;
}

/** The keys with which other programs reach the API. */
export function ApiKeysPage({ keys, organisation }: ApiKeysPageProps) {
  return (
    <>
      <PageHead
        title="API keys"
        lede="With a key another program posts readings or reads the register. It is sent as “Authorization: Bearer …”."
      />
      <NewKey />
      <DataTable
        caption="API keys"
        rows={keys}
        rowKey={(key) => key.id}
        columns={columns(organisation)}
        empty={
          <EmptyState title="No key yet.">
            Make one for each program, so that one can be revoked without the others.
          </EmptyState>
        }
      />
    </>
  );
}

function columns(organisation: Presentation): Column<ApiKeyRow>[] {
  const when = (at: Date | null) => (at ? formatInstant(at, organisation) : NOTHING);
  return [
    { key: "name", head: "For", rowHeader: true, cell: (key) => key.name },
    {
      ...{ key: "prefix", head: "Begins with" },
      cell: (key) => <span className="font-mono text-xs">{key.prefix}…</span>,
    },
    { key: "scopes", head: "May", cell: (key) => key.scopes.map(scopeWords).join(", ") },
    {
      ...{ key: "made", head: "Made" },
      cell: (key) => `${when(key.createdAt)}${key.createdByName ? ` by ${key.createdByName}` : ""}`,
    },
    { key: "used", head: "Last used", cell: (key) => when(key.lastUsedAt) },
    {
      ...{ key: "state", head: "State" },
      cell: (key) =>
        key.revokedAt ? (
          <span className="text-soft">revoked {when(key.revokedAt)}</span>
        ) : (
          <RevokeKey id={key.id} name={key.name} />
        ),
    },
  ];
}

function scopeWords(scope: string): string {
  return scope === "readings:write" ? "post readings" : "read the register";
}
