import { LinkButton } from "@/components/ui/button";
import { PageHead } from "@/components/ui/page-head";
import { hrefWith } from "@/lib/present/paging";
import { writtenNumber } from "@/lib/present/written-number";
import { deps } from "@/lib/server/deps";
import { mayUse } from "@/lib/server/may-use";
import { orNotFound } from "@/lib/server/or-not-found";
import { requireActor } from "@/lib/server/session";
import { readOrganisation } from "@/lib/usecases/read-organisation";
import { readSiteForm, saveSite } from "@/lib/usecases/save-site";
import { SiteForm } from "./site-form";

/** The form of a known site, or of a new one when `code` is null. */
export async function SiteFormPage({ code }: { code: string | null }) {
  const actor = await requireActor();
  const view = await orNotFound(() => readSiteForm(deps(), actor, { code }));
  const { locale } = await readOrganisation(deps(), actor, {});
  const { site } = view;
  const degrees = (value: number) => writtenNumber(Math.round(value * 1e7), 7, locale);
  return (
    <>
      <PageHead
        crumb={{ label: "Sites", href: "/fleet/sites" }}
        tag={site?.code}
        title={site?.name ?? "Add a site"}
        actions={
          site && (
            <LinkButton href={hrefWith("/fleet", {}, { site: site.code })}>Its assets</LinkButton>
          )
        }
      />
      <SiteForm
        id={site?.id ?? deps().newId()}
        stored={
          site && {
            ...site,
            latitude: degrees(site.latitude),
            longitude: degrees(site.longitude),
          }
        }
        crews={view.crews}
        climates={view.climates}
        mayChange={mayUse(saveSite, actor)}
      />
    </>
  );
}
