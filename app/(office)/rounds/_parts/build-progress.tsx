import { Button } from "@/components/ui/button";
import type { RoundsBoard } from "@/lib/usecases/read-rounds-board";
import type { BoardActs } from "./use-board";

const WIDTH = 240;
const HEIGHT = 36;

interface BuildProgressProps {
  plan: NonNullable<RoundsBoard["plan"]>;
  acts: BoardActs;
}

/** How a build goes: the cost of the best plan so far, falling. It may be left, and stopped. */
export function BuildProgress({ plan, acts }: BuildProgressProps) {
  const { share, costs } = plan.progress ?? { share: 0, costs: [] };
  const percent = Math.round(share * 100);
  return (
    <div
      role="status"
      className="mb-4 flex flex-wrap items-center gap-4 border border-rule bg-sheet px-3 py-2.5"
    >
      <span>
        <strong className="font-semibold">Building, {percent} %.</strong> You may leave this page;
        the draft will be here.
      </span>
      <progress max={100} value={percent} className="h-2 w-40 accent-spruce" aria-label="Build" />
      {costs.length > 1 && <CostCurve costs={costs} />}
      {acts.board.mayEdit && (
        <Button onClick={acts.stop} disabled={acts.busy || plan.stopping}>
          {plan.stopping ? "Stopping …" : "Stop, keep the best"}
        </Button>
      )}
    </div>
  );
}

function CostCurve({ costs }: { costs: readonly number[] }) {
  const [high, low] = [Math.max(...costs), Math.min(...costs)];
  const x = (i: number) => (i / (costs.length - 1)) * WIDTH;
  const y = (cost: number) => (high === low ? HEIGHT / 2 : ((high - cost) / (high - low)) * HEIGHT);
  const fall = high > 0 ? Math.round((1 - low / high) * 1000) / 10 : 0;
  return (
    <span className="flex items-center gap-2 text-sm text-soft">
      <svg width={WIDTH} height={HEIGHT} viewBox={`0 -2 ${WIDTH} ${HEIGHT + 4}`} aria-hidden="true">
        <polyline
          points={costs.map((cost, i) => `${x(i)},${y(cost)}`).join(" ")}
          className="fill-none stroke-spruce"
          strokeWidth="1.5"
        />
      </svg>
      cost {fall} % below the first plan
    </span>
  );
}
