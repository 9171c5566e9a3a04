"use server";

import { revalidatePath } from "next/cache";
import { redirect } from "next/navigation";
import { defineAction } from "@/lib/server/define-action";
import { countCells } from "@/lib/usecases/count-cells";
import { moveCells } from "@/lib/usecases/move-cells";
import { collectReturnedCells } from "@/lib/usecases/return-box";
import { receiveLot } from "@/lib/usecases/receive-lot";
import { saveCellType } from "@/lib/usecases/save-cell-type";
import { rows, texts } from "../fleet/_parts/form-entries";

const renew = () => revalidatePath("/stores", "layout");

export const receiveLotAction = defineAction(
  receiveLot,
  (form) => ({
    ...texts(form, "id", "code", "cellTypeId", "placeId", "cells", "receivedOn", "madeOn"),
    ...texts(form, "supplierReference", "unitCost"),
  }),
  renew,
);
export const moveCellsAction = defineAction(
  moveCells,
  (form) => texts(form, "id", "lotId", "fromPlaceId", "toPlaceId", "cells", "note"),
  renew,
);
export const countCellsAction = defineAction(
  countCells,
  (form) => texts(form, "id", "lotId", "placeId", "counted", "note"),
  renew,
);
export const collectReturnedAction = defineAction(
  collectReturnedCells,
  (form) => texts(form, "cellTypeId", "until"),
  renew,
);
export const saveCellTypeAction = defineAction(
  saveCellType,
  (form) =>
    ({
      ...texts(form, "id", "designation", "name", "chemistry", "size", "nominalVolts"),
      ...texts(form, "ratedCapacityAh", "ratedMilliamps", "ratedCutoffVolts"),
      ...texts(form, "ratedTemperatureC", "selfDischargePercent", "resistanceOhms"),
      ...texts(form, "maxPulseMilliamps", "massGrams", "shelfLifeMonths", "unitCost"),
      ...texts(form, "reorderPoint", "leadTimeDays"),
      points: rows(form, "points", [
        ...(["milliamps", "cutoffVolts", "temperatureC", "capacityAh", "source"] as const),
      ]),
    }) as never,
  () => {
    renew();
    redirect("/stores");
  },
);
