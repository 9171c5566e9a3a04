import { redirect } from "next/navigation";
import { requireActor } from "@/lib/server/session";

export default async function SettingsPage() {
  const { roles } = await requireActor();
  redirect(roles.includes("administrator") ? "/settings/organisation" : "/settings/crews");
}
