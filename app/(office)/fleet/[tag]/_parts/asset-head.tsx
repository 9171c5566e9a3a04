import Link from "next/link";
import type { ReactNode } from "react";
import { Caution } from "@/components/ui/notice";
import { PageHead } from "@/components/ui/page-head";
import { formatMoney } from "@/lib/present/format-quantity";
import type { AssetView } from "@/lib/usecases/read-asset";
import { plain, STATE_WORDS } from "../../_parts/fleet-words";

/** Who the asset is, where it stands, and what can be done with it. */
export function AssetHead({ view, acts }: { view: AssetView; acts: ReactNode }) {
  const { asset, organisation } = view;
  const cost = asset.silenceCostMinorPerHour ?? asset.modelSilenceCostMinorPerHour;
  const facts = [
    asset.crewName,
    asset.state === "in_service" ? null : STATE_WORDS[asset.state],
    asset.firmware && `firmware ${asset.firmware}`,
    asset.noticeDays > 0 && `needs ${asset.noticeDays} days’ notice`,
    `an hour without data costs ${formatMoney(cost, organisation)}`,
  ].filter(Boolean);
  return (
    <>
      <PageHead
        crumb={{ label: "Fleet", href: "/fleet" }}
        tag={asset.tag}
        title={asset.name}
        lede={
          <>
            <Link className="textlink" href={`/fleet/sites/${encodeURIComponent(asset.siteCode)}`}>
              {asset.siteName}
            </Link>{" "}
            ·{" "}
            <Link className="textlink" href={`/fleet/models/${asset.deviceModelId}`}>
              {asset.modelName}
            </Link>{" "}
            · {facts.join(" · ")} ·{" "}
            <Link className="textlink" href={`/fleet/${encodeURIComponent(asset.tag)}/cells`}>
              Which cell?
            </Link>
          </>
        }
        actions={acts}
      />
      {asset.hazards.length > 0 && (
        <div className="mb-3">
          <Caution title={`At this site: ${asset.hazards.map(plain).join(", ")}`}>
            {asset.tickets.length > 0 && `Tickets needed: ${asset.tickets.map(plain).join(", ")}.`}
          </Caution>
        </div>
      )}
      {asset.note && <p className="mb-3 max-w-prose">{asset.note}</p>}
    </>
  );
}
