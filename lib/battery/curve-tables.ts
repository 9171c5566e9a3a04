/**
 * What each chemistry looks like from outside: resting voltage of one element (the
 * electrochemical cell; a 9 V block has six), resistance relative to a fresh element, and
 * both against temperature. Depth of discharge is a share of the rated capacity. Sources
 * stand beside each table; "from memory" marks figures not read at a source.
 */
import type { Chemistry } from "./pack";

export interface ChemistryCurves {
  /** Nominal voltage of one element, mV. */
  readonly elementMv: number;
  readonly depth: readonly number[];
  /** Resting voltage of one element at 20 °C, mV; strictly falling. */
  readonly restMv: readonly number[];
  /** Resistance relative to fresh, at 20 °C. */
  readonly resistance: readonly number[];
  /** Resistance relative to 20 °C at each of `COLD_CELSIUS`. */
  readonly coldResistance: readonly number[];
  /** Capacity at the rated current relative to 20 °C at each of `COLD_CELSIUS`. */
  readonly coldCapacity: readonly number[];
  /** Change of the resting voltage with temperature, mV per kelvin and element. */
  readonly restMvPerKelvin: number;
  /** How far the end may lie from the depth the curves give, one standard deviation. */
  readonly endDepthSd: number;
  /** Growth of the resistance with age, share a year; from memory, rough. */
  readonly resistanceGrowthPerYear: number;
  /** How far the table may be off any maker's cell at any depth, one standard deviation, mV. */
  readonly spreadMv: number;
  /** The same for cells of one type around their own curve. */
  readonly ownSpreadMv: number;
}

/** Temperatures of the cold tables, ascending, °C. */
export const COLD_CELSIUS = [-40, -20, -10, 0, 20, 40, 60] as const;

const TENTHS = [0, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.98, 1] as const;

export const CURVES: Readonly<Record<Chemistry, ChemistryCurves>> = {
  // Rest and resistance: fitted equilibrium and R_S+R_TS+R_TL of an LR03, Chen & Rincon-Mora
  // form (C. Siegel, electrical-circuit-battery-model). Below 5 % charge drawn on to 0.8 V.
  alkaline: {
    elementMv: 1500,
    depth: TENTHS,
    restMv: [1604, 1482, 1430, 1385, 1352, 1332, 1305, 1273, 1237, 1174, 1071, 956, 880, 800],
    resistance: [1, 1.11, 1.2, 1.39, 1.57, 1.71, 1.84, 1.93, 2.03, 2.48, 8.5, 26.8, 40, 60],
    coldResistance: [14, 5, 3, 2, 1, 0.75, 0.65],
    coldCapacity: [0.05, 0.4, 0.6, 0.8, 1, 1, 1],
    restMvPerKelvin: 0.3,
    endDepthSd: 0.012,
    resistanceGrowthPerYear: 0.05,
    spreadMv: 20,
    ownSpreadMv: 11,
  },
  // From memory: sloping discharge of Leclanché and zinc chloride cells.
  "zinc-carbon": {
    elementMv: 1500,
    depth: TENTHS,
    restMv: [1640, 1570, 1520, 1460, 1410, 1365, 1320, 1270, 1210, 1130, 1020, 940, 880, 830],
    resistance: [1, 1.1, 1.2, 1.4, 1.6, 1.8, 2.1, 2.5, 3.1, 4.2, 7, 11, 16, 20],
    coldResistance: [25, 9, 4.5, 2.3, 1, 0.8, 0.7],
    coldCapacity: [0.01, 0.15, 0.4, 0.7, 1, 1, 1],
    restMvPerKelvin: 0.3,
    endDepthSd: 0.04,
    resistanceGrowthPerYear: 0.1,
    spreadMv: 40,
    ownSpreadMv: 22,
  },
  // Rest: 15 ohm log of an FR6 plus current times (V15 - V3)/(I3 - I15), Newton1026/
  // BatteryProject, on 3050 mAh. A hardly used cell rests near 1.75 V (Linden 4e p. 14.76).
  "li-fes2": {
    elementMv: 1500,
    depth: [0, 0.02, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.97, 1],
    restMv: [
      1760, 1640, 1546, 1544, 1534, 1514, 1504, 1494, 1485, 1467, 1448, 1421, 1401, 1380, 1250,
    ],
    resistance: [1, 1, 1, 1, 1, 1, 1.03, 1.11, 1.22, 1.29, 1.41, 1.65, 2.02, 2.87, 5],
    coldResistance: [4, 2.2, 1.7, 1.4, 1, 0.85, 0.75],
    coldCapacity: [0.7, 0.85, 0.9, 0.95, 1, 1, 1],
    restMvPerKelvin: 0.1,
    endDepthSd: 0.012,
    resistanceGrowthPerYear: 0.03,
    spreadMv: 17,
    ownSpreadMv: 15,
  },
  // From memory (plateau 3.6 V to about 95 %, fresh 3.67 V); plateau against temperature from
  // the span of Linden 4e Fig. 14.17b.
  "li-socl2": {
    elementMv: 3600,
    depth: TENTHS,
    restMv: [3672, 3667, 3663, 3658, 3653, 3648, 3643, 3637, 3629, 3616, 3590, 3540, 3350, 2600],
    resistance: [1, 1, 1, 1, 1.02, 1.05, 1.1, 1.15, 1.2, 1.3, 1.6, 2.2, 4, 8],
    coldResistance: [6, 3, 2.1, 1.5, 1, 0.75, 0.6],
    coldCapacity: [0.5, 0.7, 0.8, 0.9, 1, 1, 0.95],
    restMvPerKelvin: 0.25,
    endDepthSd: 0.025,
    resistanceGrowthPerYear: 0.1,
    spreadMv: 18,
    ownSpreadMv: 11,
  },
  // Rest: CR14250SE as read off its data sheet in Zephyr's battery.h, made monotone (the two
  // readings at 80 and 90 % charge are pooled). Resistance: CR2032 10 to 40 ohm over life.
  "li-mno2": {
    elementMv: 3000,
    depth: TENTHS,
    restMv: [2985, 2968, 2962, 2960, 2955, 2949, 2927, 2882, 2812, 2689, 2444, 2175, 2014, 1906],
    resistance: [1, 1, 1, 1.05, 1.1, 1.15, 1.25, 1.4, 1.6, 2, 2.8, 3.4, 3.8, 4],
    coldResistance: [9, 3, 2, 1.4, 1, 0.8, 0.7],
    coldCapacity: [0.2, 0.5, 0.7, 0.85, 1, 1, 1],
    restMvPerKelvin: 0.3,
    endDepthSd: 0.012,
    resistanceGrowthPerYear: 0.03,
    spreadMv: 26,
    ownSpreadMv: 13,
  },
  // From memory: 1.55 V plateau of a zinc-silver oxide button.
  "silver-oxide": {
    elementMv: 1550,
    depth: TENTHS,
    restMv: [1590, 1574, 1566, 1560, 1557, 1555, 1553, 1550, 1547, 1543, 1530, 1480, 1350, 1100],
    resistance: [1, 1, 1, 1, 1.05, 1.1, 1.15, 1.2, 1.3, 1.5, 2, 3, 5, 8],
    coldResistance: [15, 5, 3, 1.8, 1, 0.8, 0.7],
    coldCapacity: [0.1, 0.4, 0.65, 0.85, 1, 1, 1],
    restMvPerKelvin: 0.2,
    endDepthSd: 0.015,
    resistanceGrowthPerYear: 0.05,
    spreadMv: 14,
    ownSpreadMv: 8,
  },
  // From memory: 12.8/12.5/12.2/12.0/11.8 V at 100/75/50/25/0 % of a 12 V block, six elements.
  vrla: {
    elementMv: 2000,
    depth: [0, 0.25, 0.5, 0.75, 0.9, 0.95, 1],
    restMv: [2133, 2083, 2033, 2000, 1980, 1973, 1960],
    resistance: [1, 1.05, 1.15, 1.35, 1.8, 2.4, 4],
    coldResistance: [4, 2.2, 1.7, 1.4, 1, 0.9, 0.85],
    coldCapacity: [0.35, 0.6, 0.72, 0.84, 1, 1.05, 1.05],
    restMvPerKelvin: 0.2,
    endDepthSd: 0.025,
    resistanceGrowthPerYear: 0.1,
    spreadMv: 20,
    ownSpreadMv: 13,
  },
  // Rest: IFR18650 E1600 as read off its data sheet in Zephyr's battery.h.
  lifepo4: {
    elementMv: 3200,
    depth: [0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 1],
    restMv: [3348, 3262, 3256, 3246, 3229, 3221, 3210, 3194, 3159, 3068, 2800, 2013],
    resistance: [1, 1, 1, 1, 1, 1.05, 1.1, 1.15, 1.2, 1.4, 1.7, 2.5],
    coldResistance: [9, 4, 2.7, 1.8, 1, 0.8, 0.7],
    coldCapacity: [0.3, 0.6, 0.75, 0.88, 1, 1, 1],
    restMvPerKelvin: 0.1,
    endDepthSd: 0.015,
    resistanceGrowthPerYear: 0.05,
    spreadMv: 24,
    ownSpreadMv: 9,
  },
};
