import { PageHead } from "@/components/ui/page-head";
import type { CrewsPageProps } from "./crews-page-props";
import { CrewsTable, DepotsTable, VansTable } from "./structure-tables";
import { TechniciansTable } from "./technicians-table";

/** Technicians first, then what they belong to and start from. */
export function CrewsPage(props: CrewsPageProps) {
  return (
    <>
      <PageHead
        title="Crews"
        lede="Who drives from where, in which van, and when they work."
        actions={
          !props.mayChange && <span className="text-soft">Administrators change these.</span>
        }
      />
      <TechniciansTable {...props} />
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-6 lg:grid-cols-2">
        <CrewsTable {...props} />
        <VansTable {...props} />
        <DepotsTable {...props} />
      </div>
    </>
  );
}
