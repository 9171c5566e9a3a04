import { averageUa, peakUa } from "@/lib/battery/duty";

/** Average and peak of a duty cycle in microamps, for forms and sentences. */
export { averageUa, peakUa };
