"use client";

import { usePathname } from "next/navigation";
import { Masthead, type MastheadProps, type OfficeScreen } from "@/components/ui/masthead";

const SCREENS: Record<string, OfficeScreen> = {
  horizon: "Horizon",
  rounds: "Rounds",
  calendar: "Calendar",
  map: "Map",
  fleet: "Fleet",
  stores: "Stores",
  record: "Record",
  settings: "Settings",
};

/** The masthead, which marks the screen that the address names. */
export function OfficeMasthead(props: Omit<MastheadProps, "current">) {
  const current = SCREENS[usePathname().split("/")[1] ?? ""];
  return <Masthead {...props} {...(current && { current })} />;
}
