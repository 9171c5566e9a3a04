/** The published curves of a chemistry with what a cohort's finished packs taught laid on them. */
import { interpolate } from "../stats/interpolate";
import { CURVE_STEPS, type SampledCurves, sampledCurves } from "./curves";
import type { Chemistry, CurveLesson } from "./pack";

/** A cohort shares one lesson: each is laid on once. */
const TAUGHT = new WeakMap<CurveLesson, Map<Chemistry, SampledCurves>>();

export function taughtCurves(chemistry: Chemistry, lesson: CurveLesson): SampledCurves {
  const known = TAUGHT.get(lesson) ?? new Map<Chemistry, SampledCurves>();
  TAUGHT.set(lesson, known);
  const before = known.get(chemistry);
  if (before) return before;
  const { restMv, resistance } = sampledCurves(chemistry);
  const nodes = lesson.restShiftMv.map(
    (_, n) => (n * CURVE_STEPS) / (lesson.restShiftMv.length - 1),
  );
  const taught = {
    restMv: restMv.map((mv, i) => mv + interpolate(nodes, lesson.restShiftMv, i)),
    resistance: resistance.map((r, i) => r * interpolate(nodes, lesson.resistanceFactor, i)),
  };
  known.set(chemistry, taught);
  return taught;
}
