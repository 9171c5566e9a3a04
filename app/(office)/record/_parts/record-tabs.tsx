import { Tabs } from "@/components/ui/tabs";

export function RecordTabs({ current }: { current: "trust" | "costs" }) {
  return (
    <Tabs
      label="Record"
      items={[
        { label: "Trust", href: "/record", current: current === "trust" },
        { label: "Costs", href: "/record/costs", current: current === "costs" },
      ]}
    />
  );
}
