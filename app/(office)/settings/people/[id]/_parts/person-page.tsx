import Link from "next/link";
import { Notice } from "@/components/ui/notice";
import { PageHead, Section } from "@/components/ui/page-head";
import { roleNames } from "@/lib/present/role-names";
import { PersonActs } from "./person-acts";
import { PersonForm } from "./person-form";

export interface PersonPageProps {
  person: {
    id: string;
    name: string;
    email: string;
    roles: readonly string[];
    state: "active" | "invited" | "off";
    technicianId: string | null;
  };
  isSelf: boolean;
}

/** One person: what they may do, and their access. */
export function PersonPage({ person, isSelf }: PersonPageProps) {
  const needsCrew = person.roles.includes("technician") && !person.technicianId;
  return (
    <div className="max-w-3xl">
      <PageHead
        title={person.name}
        crumb={{ label: "People", href: "/settings/people" }}
        lede={roleNames(person.roles)}
      />
      {person.state === "off" && (
        <Notice kind="warn">This person is switched off and cannot sign in.</Notice>
      )}
      {needsCrew && (
        <Notice
          kind="warn"
          action={
            <Link className="textlink" href="/settings/crews">
              Crews
            </Link>
          }
        >
          A technician without a crew gets no rounds.
        </Notice>
      )}
      {person.technicianId && (
        <p className="mb-4">
          <Link className="textlink" href={`/settings/technicians/${person.technicianId}`}>
            Crew, van, shifts and absences
          </Link>
        </p>
      )}
      <Section title="Name and roles">
        <div className="px-3 py-4">
          <PersonForm person={person} />
        </div>
      </Section>
      <Section title="Access">
        <PersonActs id={person.id} name={person.name} state={person.state} isSelf={isSelf} />
      </Section>
    </div>
  );
}
