"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { TextInput } from "@/components/ui/inputs";
import { removeAction } from "../actions";
import type { ActContext } from "./act-context";
import { PackOutFields } from "./pack-fields";

/** Takes the pack out and leaves the asset without one. */
export function RemoveDialog({ context }: { context: ActContext }) {
  return (
    <FormDialog
      kind="quiet"
      label="Take the pack out"
      title={`Take the pack out of ${context.tag}`}
      action={removeAction}
      submit="Record it as out"
      submitKind="danger"
      done="The pack is out; the asset is without one."
    >
      {({ text }) => (
        <>
          <input type="hidden" name="assetId" value={context.assetId} />
          <input type="hidden" name="oldPackId" value={context.packId ?? ""} />
          <p>The asset stays in the register without a pack. If another goes in, record a swap.</p>
          <TextInput {...text("at", context.now)} label="Done at" type="datetime-local" />
          <PackOutFields text={text} />
        </>
      )}
    </FormDialog>
  );
}
