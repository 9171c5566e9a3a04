import { Tabs } from "@/components/ui/tabs";

const TABS = [
  ["cells", "Cells", "/stores"],
  ["lots", "Lots", "/stores/lots"],
  ["demand", "Demand", "/stores/demand"],
  ["moves", "Moves", "/stores/moves"],
  ["return-box", "Return box", "/stores/return-box"],
] as const;

/** The parts of the stores. */
export function StoresTabs({ current }: { current: (typeof TABS)[number][0] }) {
  const items = TABS.map(([key, label, href]) => ({ label, href, current: key === current }));
  return <Tabs label="Stores" items={items} />;
}
