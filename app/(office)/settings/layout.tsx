import type { ReactNode } from "react";
import { requireActor } from "@/lib/server/session";
import { SettingsTabs } from "./_parts/settings-tabs";

export default async function SettingsLayout({ children }: { children: ReactNode }) {
  const { roles } = await requireActor();
  return (
    <>
      <SettingsTabs roles={roles} />
      {children}
    </>
  );
}
