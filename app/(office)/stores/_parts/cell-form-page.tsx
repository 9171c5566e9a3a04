import { PageHead } from "@/components/ui/page-head";
import { writtenMoney, writtenNumber } from "@/lib/present/written-number";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { readCellTypeForm, saveCellType } from "@/lib/usecases/save-cell-type";
import { CellForm } from "./cell-form";

/** The form of a known cell type, or of a new one when `id` is null. */
export async function CellFormPage({ id }: { id: string | null }) {
  const actor = await requireActor();
  const view = await orNotFound(() => readCellTypeForm(deps(), actor, { id }));
  const { cellType, organisation } = view;
  const write = (value: number | null, digits: number) =>
    writtenNumber(value, digits, organisation.locale);
  return (
    <>
      <PageHead
        crumb={{ label: "Stores", href: "/stores" }}
        title={cellType ? cellType.designation : "Add a cell type"}
        lede={cellType?.name}
      />
      <CellForm
        id={cellType?.id ?? deps().newId()}
        currency={organisation.currency}
        mayChange={mayUse(saveCellType, actor)}
        stored={
          cellType && {
            ...{ designation: cellType.designation, name: cellType.name, size: cellType.size },
            chemistry: cellType.chemistry,
            nominalVolts: write(cellType.nominalMv, 3),
            ratedCapacityAh: write(cellType.ratedCapacityMah, 3),
            ratedMilliamps: write(cellType.ratedCurrentUa, 3),
            ratedCutoffVolts: write(cellType.ratedCutoffMv, 3),
            ratedTemperatureC: write(cellType.ratedTemperatureDc, 1),
            selfDischargePercent: write(cellType.selfDischargePpmPerYear, 4),
            resistanceOhms: write(cellType.resistanceMohm, 3),
            maxPulseMilliamps: write(cellType.maxPulseUa, 3),
            massGrams: write(cellType.massMg, 3),
            shelfLifeMonths: write(cellType.shelfLifeMonths, 0),
            unitCost: writtenMoney(cellType.unitCostMinor, organisation.locale),
            reorderPoint: write(cellType.reorderPoint, 0),
            leadTimeDays: write(cellType.leadTimeDays, 0),
            points: cellType.points.map((p) => ({
              milliamps: write(p.currentUa, 3),
              cutoffVolts: write(p.cutoffMv, 3),
              temperatureC: write(p.temperatureDc, 1),
              capacityAh: write(p.capacityMah, 3),
              source: p.source,
            })),
          }
        }
      />
    </>
  );
}
