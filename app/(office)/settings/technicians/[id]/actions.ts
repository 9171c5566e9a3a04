"use server";

import { revalidatePath } from "next/cache";
import { redirect } from "next/navigation";
import { defineAction } from "@/lib/server/define-action";
import { recordAbsence } from "@/lib/usecases/record-absence";
import { removeAbsence } from "@/lib/usecases/remove-absence";
import { removeTechnician } from "@/lib/usecases/remove-technician";
import { TICKETS } from "@/lib/usecases/save-site";
import { saveTechnician } from "@/lib/usecases/save-technician";
import { text, ticked, weekdaysOf } from "../../_parts/read-form";

const renew = () => revalidatePath("/settings", "layout");

export const saveTechnicianAction = defineAction(
  saveTechnician,
  (form) => ({
    id: text(form, "id"),
    personId: text(form, "personId"),
    crewId: text(form, "crewId"),
    vanId: text(form, "vanId"),
    tickets: ticked(form, "ticket", TICKETS),
    shifts: weekdaysOf(form).map((weekday) => ({
      weekday,
      starts: text(form, `starts-${weekday}`),
      ends: text(form, `ends-${weekday}`),
      breakStarts: text(form, `breakStarts-${weekday}`),
      breakEnds: text(form, `breakEnds-${weekday}`),
    })),
  }),
  ({ technicianId }, form) => {
    renew();
    if (form.has("isNew")) redirect(`/settings/technicians/${technicianId}`);
  },
);

export const removeTechnicianAction = defineAction(
  removeTechnician,
  (form) => ({ id: text(form, "id") }),
  () => {
    renew();
    redirect("/settings/crews");
  },
);

export const recordAbsenceAction = defineAction(
  recordAbsence,
  (form) => ({
    technicianId: text(form, "technicianId"),
    firstDay: text(form, "firstDay"),
    lastDay: text(form, "lastDay"),
    reason: text(form, "reason"),
  }),
  renew,
);

export const removeAbsenceAction = defineAction(
  removeAbsence,
  (form) => ({ absenceId: text(form, "id") }),
  renew,
);
