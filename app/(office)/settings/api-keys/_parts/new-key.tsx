"use client";

import { useState } from "react";
import { ActionForm } from "@/components/forms/action-form";
import { Button } from "@/components/ui/button";
import { Checkbox, TextInput } from "@/components/ui/inputs";
import { Notice } from "@/components/ui/notice";
import { EditDialog } from "../../_parts/edit-dialog";
import { createApiKeyAction } from "../actions";

interface Made {
  name: string;
  secret: string;
}

/** Makes a key and shows its secret this once. */
export function NewKey() {
  const [made, setMade] = useState<Made | null>(null);
  return (
    <div className="mb-4">
      {made && <Secret made={made} onPutAway={() => setMade(null)} />}
      <EditDialog label="Make a key…" title="Make an API key" kind="go">
        {(close) => (
          <ActionForm
            action={createApiKeyAction}
            submit="Make the key"
            onDone={(key) => {
              setMade(key);
              close();
            }}
          >
            {(entries) => {
              const { key: writeKey, ...write } = entries.tick("scope-readings:write", true);
              const { key: readKey, ...read } = entries.tick("scope-register:read");
              return (
                <>
                  <TextInput
                    label="What it is for"
                    hint="The program that will use it"
                    maxLength={100}
                    {...entries.text("name")}
                  />
                  <fieldset>
                    <legend className="mb-1 font-medium">It may</legend>
                    <Checkbox key={writeKey} {...write} label="post readings" />
                    <Checkbox key={readKey} {...read} label="read the register" />
                    {entries.fault("scopes") && (
                      <p className="font-medium text-brick-ink">{entries.fault("scopes")}</p>
                    )}
                  </fieldset>
                </>
              );
            }}
          </ActionForm>
        )}
      </EditDialog>
    </div>
  );
}

function Secret({ made, onPutAway }: { made: Made; onPutAway: () => void }) {
  const [copied, setCopied] = useState(false);
  const copy = async () => {
    await navigator.clipboard.writeText(made.secret);
    setCopied(true);
  };
  return (
    <Notice
      kind="warn"
      word="Copy it now"
      action={
        <div className="flex gap-2">
          <Button onClick={copy}>{copied ? "Copied" : "Copy"}</Button>
          <Button onClick={onPutAway}>Put away</Button>
        </div>
      }
    >
      The key for {made.name} is shown this once and cannot be read again:
      <code className="mt-1 block font-mono text-sm break-all select-all">{made.secret}</code>
    </Notice>
  );
}
