import { Tabs } from "@/components/ui/tabs";

const TABS = [
  ["assets", "Assets", "/fleet"],
  ["sites", "Sites", "/fleet/sites"],
  ["models", "Device models", "/fleet/models"],
  ["import", "Import", "/import"],
] as const;

/** The parts of the register. */
export function FleetTabs({ current }: { current: (typeof TABS)[number][0] }) {
  const items = TABS.map(([key, label, href]) => ({ label, href, current: key === current }));
  return <Tabs label="Fleet" items={items} />;
}
