import type { Metadata } from "next";
import { PageHead } from "@/components/ui/page-head";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { requireActor } from "@/lib/server/session";
import { changeOrganisation } from "@/lib/usecases/change-organisation";
import { minorDigits } from "@/lib/usecases/organisation-fields";
import { readOrganisation } from "@/lib/usecases/read-organisation";
import { NoPermission } from "../../_parts/no-permission";
import { OrganisationForm } from "./_parts/organisation-form";

export const metadata: Metadata = { title: "Organisation" };

export default async function OrganisationPage() {
  const actor = await requireActor();
  if (!mayUse(changeOrganisation, actor)) {
    return <NoPermission title="Organisation" who="administrators" />;
  }
  const organisation = await readOrganisation(deps(), actor, {});
  return (
    <>
      <PageHead
        title="Organisation"
        lede="How dates, money and hours are written, and what planning reckons with."
      />
      <OrganisationForm
        organisation={organisation}
        digits={minorDigits(organisation.currency)}
        zones={Intl.supportedValuesOf("timeZone")}
      />
    </>
  );
}
