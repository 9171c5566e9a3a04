import Link from "next/link";
import type { ReactNode } from "react";
import { Button } from "@/components/ui/button";
import { ToastRegion } from "@/components/ui/toast";
import { formatToday } from "@/lib/present/format-week";
import { roleNames } from "@/lib/present/role-names";
import { deps } from "@/lib/server/deps";
import { requireActor } from "@/lib/server/session";
import { readOrganisation } from "@/lib/usecases/read-organisation";
import { signOutAction } from "../(entry)/sign-out/actions";
import { FieldOnly } from "./_parts/field-only";
import { OfficeMasthead } from "./_parts/office-masthead";
import { QueryProvider } from "./_parts/query-provider";

export default async function OfficeLayout({ children }: { children: ReactNode }) {
  const actor = await requireActor();
  const organisation = await readOrganisation(deps(), actor, {});
  const inOffice = actor.roles.some((role) => role !== "technician");
  return (
    <>
      <OfficeMasthead
        today={formatToday(deps().now(), organisation)}
        person={{ name: actor.name, role: roleNames(actor.roles) }}
        allowed={screensFor(actor.roles)}
      >
        <Link className="textlink" href="/account">
          Your account
        </Link>
        {actor.technicianId && (
          <Link className="textlink" href="/today">
            Today’s round
          </Link>
        )}
        <form action={signOutAction} className="flex flex-col">
          <Button type="submit">Sign out</Button>
        </form>
      </OfficeMasthead>
      <main id="main" className="page" tabIndex={-1}>
        <QueryProvider>{inOffice ? children : <FieldOnly />}</QueryProvider>
      </main>
      <ToastRegion />
    </>
  );
}

const FOR_READERS = ["Horizon", "Rounds", "Calendar", "Map", "Fleet", "Stores", "Record"] as const;

function screensFor(roles: readonly string[]) {
  if (roles.every((role) => role === "technician")) return [];
  return [...FOR_READERS, "Settings"] as const;
}
