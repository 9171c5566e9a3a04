"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { collectReturnedAction } from "../actions";

/** Says that recycling has taken all cells of a type that the page showed. */
export function CollectDialog(props: {
  cellTypeId: string;
  designation: string;
  cells: number;
  until: string;
}) {
  const { cellTypeId, designation, cells, until } = props;
  return (
    <FormDialog
      kind="quiet"
      label="Collected"
      name={`${designation} collected for recycling`}
      title={`${designation} collected for recycling`}
      action={collectReturnedAction}
      submit={`${cells} cells are gone`}
      done={(result) => `${result.cells} cells went to recycling.`}
    >
      {() => (
        <>
          <input type="hidden" name="cellTypeId" value={cellTypeId} />
          <input type="hidden" name="until" value={until} />
          <p>
            {cells} × {designation} leave the return box. Cells that come in after this page was
            loaded stay. This cannot be undone here.
          </p>
        </>
      )}
    </FormDialog>
  );
}
