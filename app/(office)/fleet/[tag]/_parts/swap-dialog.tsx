"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { TextInput } from "@/components/ui/inputs";
import { Caution } from "@/components/ui/notice";
import { swapAction } from "../actions";
import type { ActContext } from "./act-context";
import { PackInFields, PackOutFields } from "./pack-fields";

/** Records a swap: one pack out, another in. */
export function SwapDialog({ context }: { context: ActContext }) {
  return (
    <FormDialog
      label="Record a swap"
      title={`Swap of ${context.tag}`}
      action={swapAction}
      submit="Record the swap"
      done="The swap is recorded; the new pack’s forecast is being made."
    >
      {({ text }, id) => (
        <>
          <input type="hidden" name="packId" value={id} />
          <input type="hidden" name="assetId" value={context.assetId} />
          <input type="hidden" name="oldPackId" value={context.packId ?? ""} />
          <Caution title="Cells">
            Never mix old and new cells or types. Mind polarity; insulate the ends of what comes
            out.
          </Caution>
          <TextInput {...text("at", context.now)} label="Done at" type="datetime-local" />
          <h3 className="caps">Out</h3>
          <PackOutFields text={text} />
          <h3 className="caps">In</h3>
          <PackInFields text={text} context={context} />
        </>
      )}
    </FormDialog>
  );
}
