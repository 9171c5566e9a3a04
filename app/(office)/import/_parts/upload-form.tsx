"use client";

import { useRouter } from "next/navigation";
import { type FormEvent, useState } from "react";
import { Button } from "@/components/ui/button";
import { controlClass, Field } from "@/components/ui/field";
import { Notice } from "@/components/ui/notice";
import { Select } from "@/components/ui/select";
import { KIND_WORDS } from "./import-words";

/** Chooses a file and what it holds, and sends it. */
export function UploadForm() {
  const router = useRouter();
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const send = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    setBusy(true);
    setTrouble(null);
    const answer = await upload(form.get("file"), String(form.get("kind")));
    setBusy(false);
    if (answer.trouble) setTrouble(answer.trouble);
    else router.push(`/import/${answer.id}`);
  };
  return (
    <form onSubmit={send} className="mb-5 max-w-3xl border border-rule bg-sheet px-4 py-4">
      {trouble && <Notice kind="trouble">{trouble}</Notice>}
      <div className="grid items-end gap-4 sm:grid-cols-[1fr_1fr_auto]">
        <Select
          name="kind"
          label="The file holds"
          defaultValue="assets"
          options={Object.entries(KIND_WORDS).map(([value, label]) => ({ value, label }))}
        />
        <Field name="file" label="CSV file, UTF-8">
          {(wiring) => (
            <input
              {...wiring}
              type="file"
              name="file"
              accept=".csv,.txt,text/csv"
              required
              className={controlClass}
            />
          )}
        </Field>
        <Button type="submit" kind="go" busy={busy && "Sending…"}>
          Look at it
        </Button>
      </div>
      <p className="mt-3 text-soft">
        Order for an empty register: cell types, device models, assets, installs, readings. The
        first row names the columns.
      </p>
    </form>
  );
}

async function upload(file: FormDataEntryValue | null, kind: string) {
  const id = crypto.randomUUID();
  if (!(file instanceof File) || file.size === 0) return { id, trouble: "Choose a file." };
  const query = new URLSearchParams({ id, kind, name: file.name });
  try {
    const response = await fetch(`/api/v1/imports?${query}`, { method: "POST", body: file });
    if (response.ok) return { id, trouble: null };
    const { error } = (await response.json()) as {
      error: { message: string; faults: { message: string }[] };
    };
    return { id, trouble: error.faults[0]?.message ?? error.message };
  } catch {
    return { id, trouble: "No connection. Nothing was sent; please try again." };
  }
}
