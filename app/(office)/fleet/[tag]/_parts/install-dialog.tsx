"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { TextInput } from "@/components/ui/inputs";
import { installAction } from "../actions";
import type { ActContext } from "./act-context";
import { PackInFields } from "./pack-fields";

/** Records the first pack, or the first after an empty spell. */
export function InstallDialog({ context }: { context: ActContext }) {
  return (
    <FormDialog
      kind="go"
      label="Record an install"
      title={`Pack into ${context.tag}`}
      action={installAction}
      submit="Record the install"
      done="The pack is in; its forecast is being made."
    >
      {({ text }, id) => (
        <>
          <input type="hidden" name="packId" value={id} />
          <input type="hidden" name="assetId" value={context.assetId} />
          <TextInput {...text("at", context.now)} label="Done at" type="datetime-local" />
          <PackInFields text={text} context={context} />
        </>
      )}
    </FormDialog>
  );
}
