"use client";

import { useRouter } from "next/navigation";
import { ActionForm, type Entries } from "@/components/forms/action-form";
import { Checkbox } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import { hrefWith } from "@/lib/present/paging";
import type { ImportView } from "@/lib/usecases/read-import";
import { checkImportAction } from "../actions";
import { ColumnTable } from "./column-table";

const DELIMITERS = [
  { value: "comma", label: "comma ," },
  { value: "semicolon", label: "semicolon ;" },
  { value: "tab", label: "tab" },
];
const SIGNS: Record<string, string> = { comma: ",", semicolon: ";", tab: "\t" };
const DECIMALS = [
  { value: ".", label: "point 3.48" },
  { value: ",", label: "comma 3,48" },
];
const ORDERS = [
  { value: "year-first", label: "year first 2026-12-31" },
  { value: "day-first", label: "day first 31.12.2026" },
  { value: "month-first", label: "month first 12/31/2026" },
];

/** How the file is written and which column is which; guessed, and to be put right here. */
export function ImportSettings({ view }: { view: ImportView }) {
  return (
    <section className="mb-5 border border-rule bg-sheet px-4 py-4">
      <h2 className="caps mb-3">How to read it</h2>
      <ActionForm
        action={checkImportAction}
        submit="See what each row would do"
        busy="Asking…"
        kind={view.run.state === "checked" ? "plain" : "go"}
      >
        {(entries) => (
          <>
            <input type="hidden" name="importId" value={view.run.id} />
            <Format view={view} entries={entries} />
            <ColumnTable view={view} entries={entries} />
          </>
        )}
      </ActionForm>
    </section>
  );
}

function Format({ view, entries: { text, tick } }: { view: ImportView; entries: Entries }) {
  const router = useRouter();
  const { settings, kind, id } = view.run;
  const named = Object.entries(SIGNS).find(([, sign]) => sign === view.delimiter)?.[0];
  const { key, ...close } = tick("closePrevious", settings.closePrevious);
  return (
    <>
      <div className="grid max-w-3xl gap-4 sm:grid-cols-3">
        <Select
          {...text("delimiter", named)}
          label="Between fields"
          options={DELIMITERS}
          onChange={(event) =>
            router.push(
              hrefWith(`/import/${id}`, {}, { delimiter: SIGNS[event.target.value] ?? null }),
            )
          }
        />
        <Select {...text("decimal", settings.decimal)} label="Decimals" options={DECIMALS} />
        <Select {...text("dayOrder", settings.dayOrder)} label="Dates" options={ORDERS} />
      </div>
      {kind === "installs" && (
        <Checkbox
          key={key}
          {...close}
          label="Where a removal is not given, the next install ends the pack before it"
        />
      )}
    </>
  );
}
