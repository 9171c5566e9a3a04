"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { Select } from "@/components/ui/select";
import { choices, STATE_WORDS } from "../../_parts/fleet-words";
import { changeStateAction } from "../actions";
import type { ActContext } from "./act-context";

/** Puts an asset into service, into store or out of use. */
export function StateDialog({ context, state }: { context: ActContext; state: string }) {
  return (
    <FormDialog
      kind="quiet"
      label="State"
      title={`State of ${context.tag}`}
      action={changeStateAction}
      submit="Save"
      done="The state is changed."
    >
      {({ text }) => (
        <>
          <input type="hidden" name="assetId" value={context.assetId} />
          <Select {...text("state", state)} label="State" options={choices(STATE_WORDS)} />
          <p className="text-soft">
            Only assets in service are forecast for rounds. A retired asset keeps its history; it
            can come back.
          </p>
        </>
      )}
    </FormDialog>
  );
}
