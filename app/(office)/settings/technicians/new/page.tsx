import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { listCrews } from "@/lib/usecases/list-crews";
import { saveTechnician } from "@/lib/usecases/save-technician";
import { NoPermission } from "../../../_parts/no-permission";
import { TechnicianForm } from "../[id]/_parts/technician-form";

export const metadata: Metadata = { title: "Add to a crew" };

export default async function NewTechnicianPage() {
  const actor = await requireActor();
  if (!mayUse(saveTechnician, actor)) return <NoPermission title="Crews" who="administrators" />;
  const { crews, vans, people, organisation } = await listCrews(deps(), actor, {});
  return (
    <div className="max-w-3xl">
      <PageHead title="Add to a crew" crumb={{ label: "Crews", href: "/settings/crews" }} />
      <TechnicianForm
        id={deps().newId()}
        {...{ people, crews, vans }}
        workingDays={organisation.workingDays}
        locale={organisation.locale}
      />
    </div>
  );
}
