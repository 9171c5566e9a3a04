import { Tabs } from "@/components/ui/tabs";

const TABS = [
  ["trust", "Trust", "/record"],
  ["findings", "Findings", "/record/findings"],
  ["readings", "Readings in doubt", "/record/readings"],
  ["costs", "Costs", "/record/costs"],
  ["policies", "Policies", "/record/policies"],
] as const;

/** The parts of the record. */
export function RecordTabs({ current }: { current: (typeof TABS)[number][0] }) {
  const items = TABS.map(([key, label, href]) => ({ label, href, current: key === current }));
  return <Tabs label="Record" items={items} />;
}
