import { VoltagePlate } from "@/components/charts/voltage-plate";
import { Notice } from "@/components/ui/notice";
import type { Plate } from "./use-plate";

/** The plate with its words; it says so where nothing can be computed. */
export function PlateView({ plate }: { plate: Plate | null }) {
  if (!plate) {
    return <p className="text-soft">Nothing is known of this pack yet to compare with.</p>;
  }
  const { model, words } = plate;
  return (
    <div className="flex flex-col gap-2">
      <VoltagePlate model={model} decorative={words !== null} />
      <div role="status" className="min-h-11">
        {words ? (
          words.impossible ? (
            <Notice kind="warn">{words.impossible}</Notice>
          ) : (
            <p>
              <strong>{words.verdict}</strong> <span className="text-soft">{words.band}</span>.{" "}
              {words.window} {words.left}.
            </p>
          )
        ) : (
          <p className="text-soft">{model.description}</p>
        )}
      </div>
    </div>
  );
}
