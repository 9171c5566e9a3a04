"use client";

import { usePathname } from "next/navigation";
import { Tabs } from "@/components/ui/tabs";

const PARTS: readonly { label: string; path: string; roles: readonly string[] }[] = [
  { label: "Organisation", path: "organisation", roles: ["administrator"] },
  { label: "People", path: "people", roles: ["administrator"] },
  { label: "Crews", path: "crews", roles: ["administrator", "dispatcher", "supervisor"] },
  { label: "Climates", path: "climates", roles: ["administrator", "dispatcher", "supervisor"] },
  { label: "Digests", path: "digests", roles: ["administrator", "dispatcher", "supervisor"] },
  { label: "API keys", path: "api-keys", roles: ["administrator"] },
  { label: "Mails", path: "mails", roles: ["administrator"] },
  { label: "Who did what", path: "audit", roles: ["administrator", "supervisor"] },
];

/** The parts of Settings that this person may open. */
export function SettingsTabs({ roles }: { roles: readonly string[] }) {
  const here = usePathname().split("/")[2] ?? "";
  const current = here === "technicians" ? "crews" : here;
  const items = PARTS.filter((part) => part.roles.some((role) => roles.includes(role))).map(
    ({ label, path }) => ({ label, href: `/settings/${path}`, current: path === current }),
  );
  return <Tabs label="Settings" items={items} />;
}
