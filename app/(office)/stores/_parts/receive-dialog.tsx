"use client";

import { FormDialog } from "@/components/forms/form-dialog";
import { NumberInput, TextInput } from "@/components/ui/inputs";
import { Caution } from "@/components/ui/notice";
import { Select } from "@/components/ui/select";
import type { LotsView } from "@/lib/usecases/read-stores";
import { receiveLotAction } from "../actions";

/** Takes a delivery in. */
export function ReceiveDialog({ view, today }: { view: LotsView; today: string }) {
  const types = view.cellTypes.filter((c) => !c.retired);
  const stores = view.places.filter((p) => p.kind === "stores");
  return (
    <FormDialog
      kind="go"
      label="Receive a lot"
      title="Receive a lot"
      action={receiveLotAction}
      submit="Receive it"
      done={(r) => `Lot ${r.code} is in.`}
    >
      {({ text }, id) => (
        <>
          <input type="hidden" name="id" value={id} />
          <Caution title="Cells in store">
            Keep them dry and cool; leave out damaged ones. Lithium cells travel under transport
            rules.
          </Caution>
          <div className="grid gap-4 sm:grid-cols-2">
            <TextInput {...text("code")} label="Lot code" hint="As on the box." />
            <Select
              {...text("cellTypeId", types[0]?.id)}
              label="Cells"
              options={types.map((c) => ({ value: c.id, label: `${c.designation} ${c.name}` }))}
            />
            <NumberInput {...text("cells")} label="How many" unit="cells" />
            <NumberInput
              {...text("unitCost", "0")}
              label="A cell costs"
              unit={view.organisation.currency}
            />
            <TextInput {...text("receivedOn", today)} label="Received on" type="date" />
            <TextInput {...text("madeOn")} label="Made on (date code)" type="date" optional />
            <Select
              {...text("placeId", stores[0]?.id)}
              label="Put into"
              options={view.places.map((p) => ({ value: p.id, label: p.name }))}
            />
            <TextInput {...text("supplierReference")} label="Supplier’s reference" optional />
          </div>
        </>
      )}
    </FormDialog>
  );
}
