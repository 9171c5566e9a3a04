import type { Metadata } from "next";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { readTechnician } from "@/lib/usecases/read-technician";
import { recordAbsence } from "@/lib/usecases/record-absence";
import { saveTechnician } from "@/lib/usecases/save-technician";
import { NoPermission } from "../../../_parts/no-permission";
import { TechnicianPage } from "./_parts/technician-page";

export const metadata: Metadata = { title: "Technician" };

export default async function Page({ params }: { params: Promise<{ id: string }> }) {
  const actor = await requireActor();
  if (!mayUse(readTechnician, actor)) return <NoPermission title="Crews" who="the office" />;
  const { id } = await params;
  const view = await orNotFound(() => readTechnician(deps(), actor, { technicianId: id }));
  return (
    <TechnicianPage
      view={view}
      mayChange={mayUse(saveTechnician, actor)}
      mayRecordAbsence={mayUse(recordAbsence, actor)}
    />
  );
}
