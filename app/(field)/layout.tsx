import type { Metadata } from "next";
import { redirect } from "next/navigation";
import type { ReactNode } from "react";
import { requireActor } from "@/lib/server/session";

export const metadata: Metadata = {
  manifest: "/manifest.webmanifest",
  appleWebApp: { capable: true, title: "Wanewright" },
};

const FIELD_ROLES = ["technician", "dispatcher", "administrator"];

/**
 * The phone pages. Nothing here says who is signed in: these pages are kept on the phone, and
 * what belongs to a person stands in the phone's own store.
 */
export default async function FieldLayout({ children }: { children: ReactNode }) {
  const actor = await requireActor();
  if (!actor.roles.some((role) => FIELD_ROLES.includes(role))) redirect("/");
  return (
    <div data-surface="field" className="min-h-dvh">
      {children}
    </div>
  );
}
