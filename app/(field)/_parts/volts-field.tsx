import { NumberInput } from "@/components/ui/inputs";
import type { DayAsset, DayPack } from "@/lib/sync/day-pack";
import { PlateView } from "./plate-view";
import { thousandths } from "./typed-number";
import { usePlate } from "./use-plate";

/** A voltage within a longer form; the old pack's shows its plate as soon as it is typed. */
export function VoltsField(props: {
  day: DayPack;
  asset: DayAsset;
  kind: "resting" | "loaded";
  label: string;
  value: string;
  onChange: (value: string) => void;
}) {
  const { day, asset, kind, label, value, onChange } = props;
  const millivolts = thousandths(value);
  const plate = usePlate(day, asset, { millivolts, kind, loadUa: null, temperatureDc: null });
  return (
    <div className="flex flex-col gap-2">
      <NumberInput
        {...{ name: `volts-${kind}`, label, unit: "V", optional: kind === "loaded", value }}
        onChange={(event) => onChange(event.target.value)}
      />
      {kind === "resting" && millivolts !== null && <PlateView plate={plate} />}
    </div>
  );
}
