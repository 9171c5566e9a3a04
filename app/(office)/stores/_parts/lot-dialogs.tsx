"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { Select } from "@/components/ui/select";
import type { LotsView } from "@/lib/usecases/read-stores";
import { countCellsAction, moveCellsAction } from "../actions";

export interface LotDialogProps {
  lot: LotsView["lots"][number];
  places: LotsView["places"];
}

const offer = (list: readonly { id: string; name: string }[]) =>
  list.map((p) => ({ value: p.id, label: p.name }));

/** Moves cells of a lot to another place: to a van, to the return box. */
export function MoveDialog({ lot, places }: LotDialogProps) {
  const holding = lot.places.map((p) => ({ value: p.id, label: `${p.name} (${p.cells})` }));
  return (
    <FormDialog
      kind="quiet"
      label="Move"
      name={`Move cells of lot ${lot.code}`}
      title={`Move cells of lot ${lot.code}`}
      action={moveCellsAction}
      submit="Move them"
      done="Moved."
    >
      {({ text }, id) => (
        <>
          <input type="hidden" name="id" value={id} />
          <input type="hidden" name="lotId" value={lot.id} />
          <Select
            {...text("fromPlaceId", holding[0]?.value)}
            label="From"
            options={holding}
            placeholder={holding.length === 0 ? "None are counted anywhere" : undefined}
          />
          <Select {...text("toPlaceId")} label="To" options={offer(places)} placeholder="Choose" />
          <NumberInput {...text("cells")} label="How many" unit="cells" />
          <TextInput {...text("note")} label="Note" optional />
        </>
      )}
    </FormDialog>
  );
}

/** Puts a count right; the difference goes into the book. */
export function CountDialog({ lot, places }: LotDialogProps) {
  return (
    <FormDialog
      kind="quiet"
      label="Count"
      name={`Count lot ${lot.code}`}
      title={`Count lot ${lot.code}`}
      action={countCellsAction}
      submit="Save the count"
      done={(r) => (r.difference === 0 ? "The count was right." : `Put right by ${r.difference}.`)}
    >
      {({ text }, id) => (
        <>
          <input type="hidden" name="id" value={id} />
          <input type="hidden" name="lotId" value={lot.id} />
          <Select
            {...text("placeId", lot.places[0]?.id ?? places[0]?.id)}
            label="Where"
            options={offer(places)}
          />
          <NumberInput {...text("counted")} label="Cells that lie there" unit="cells" />
          <TextInput {...text("note")} label="Note" optional />
        </>
      )}
    </FormDialog>
  );
}
