import { PageHead, Section } from "@/components/ui/page-head";
import type { TechnicianView } from "@/lib/usecases/read-technician";
import { ConfirmRemoval } from "../../../_parts/confirm-removal";
import { removeTechnicianAction } from "../actions";
import { AbsenceList } from "./absence-list";
import { TechnicianForm } from "./technician-form";

export interface TechnicianPageProps {
  view: TechnicianView;
  mayChange: boolean;
  mayRecordAbsence: boolean;
}

/** One technician: crew, van, tickets, shifts; absences. */
export function TechnicianPage({ view, mayChange, mayRecordAbsence }: TechnicianPageProps) {
  const { technician, crews, vans, organisation } = view;
  return (
    <div className="max-w-3xl">
      <PageHead
        title={technician.name}
        crumb={{ label: "Crews", href: "/settings/crews" }}
        lede={technician.crewName}
        actions={
          mayChange && (
            <ConfirmRemoval
              id={technician.id}
              called={technician.name}
              loses="Takes the person out of the crews, with shifts and absences. The account stays."
              action={removeTechnicianAction}
            />
          )
        }
      />
      <Section title="Absences">
        <AbsenceList view={view} mayChange={mayRecordAbsence} />
      </Section>
      <TechnicianForm
        id={technician.id}
        people={[{ id: technician.personId, name: technician.name }]}
        {...{ crews, vans }}
        stored={technician}
        workingDays={organisation.workingDays}
        locale={organisation.locale}
        readOnly={!mayChange}
      />
    </div>
  );
}
