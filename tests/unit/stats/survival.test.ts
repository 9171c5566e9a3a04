import { describe, expect, test } from "vitest";
import {
  type AcceleratedLife,
  fitAcceleratedLife,
  lifeQuantile,
} from "../../../lib/stats/accelerated-life";
import { normalCdf } from "../../../lib/stats/normal";
import {
  type Life,
  logLogInterval,
  logRank,
  stepAt,
  survivalQuantile,
  survivalSteps,
} from "../../../lib/stats/survival";

const lives = (times: readonly number[], ended: readonly number[]): Life[] =>
  times.map((time, i) => ({ time, ended: ended[i] === 1 }));

// Miller, Survival Analysis, 1997: remission of acute myelogenous leukaemia, both arms, as in
// R 4.2.2, survival 3.5-3 (data set aml). Reference values below were printed by that package.
const MAINTAINED = lives(
  [9, 13, 13, 18, 23, 28, 31, 34, 45, 48, 161],
  [1, 1, 0, 1, 1, 0, 1, 1, 0, 1, 0],
);
const NOT_MAINTAINED = lives(
  [5, 5, 8, 8, 12, 16, 23, 27, 30, 33, 43, 45],
  [1, 1, 1, 1, 1, 0, 1, 1, 1, 1, 1, 1],
);

// Freireich et al., 1963, 6-MP arm (R: MASS::gehan).
const SIX_MP = lives(
  [10, 7, 32, 23, 22, 6, 16, 34, 32, 25, 11, 20, 19, 6, 17, 35, 6, 13, 9, 6, 10],
  [1, 1, 0, 1, 1, 1, 1, 0, 0, 0, 0, 0, 0, 1, 0, 0, 1, 1, 0, 0, 0],
);

describe("Kaplan-Meier and Nelson-Aalen, R 4.2.2 survival 3.5-3", () => {
  test("aml, maintained", () => {
    const steps = survivalSteps(MAINTAINED);
    expect(steps.map((s) => s.time)).toEqual([9, 13, 18, 23, 31, 34, 48]);
    const s = [0.9090909, 0.8181818, 0.7159091, 0.6136364, 0.4909091, 0.3681818, 0.1840909];
    const se = [0.0866784, 0.1162913, 0.139665, 0.1526323, 0.1641933, 0.1626689, 0.1534927];
    steps.forEach((step, i) => {
      expect(step.survival).toBeCloseTo(s[i]!, 6);
      expect(step.se).toBeCloseTo(se[i]!, 6);
    });
    expect(survivalQuantile(steps)).toBe(31);
  });

  test("log-log interval at 23", () => {
    const [low, high] = logLogInterval(stepAt(survivalSteps(MAINTAINED), 23)!);
    expect(low).toBeCloseTo(0.265752, 6);
    expect(high).toBeCloseTo(0.835299, 6);
  });

  test("6-MP", () => {
    const steps = survivalSteps(SIX_MP);
    expect(steps.map((s) => s.time)).toEqual([6, 7, 10, 13, 16, 22, 23]);
    const s = [0.857143, 0.806723, 0.752941, 0.690196, 0.627451, 0.537815, 0.448179];
    const se = [0.07636, 0.086935, 0.09635, 0.106815, 0.114054, 0.128234, 0.134591];
    steps.forEach((step, i) => {
      expect(step.survival).toBeCloseTo(s[i]!, 6);
      expect(step.se).toBeCloseTo(se[i]!, 6);
    });
  });

  test("cumulative hazard of both arms", () => {
    const steps = survivalSteps([...MAINTAINED, ...NOT_MAINTAINED]);
    expect(stepAt(steps, 23)!.hazard).toBeCloseTo(0.57448, 5);
    expect(stepAt(steps, 48)!.hazard).toBeCloseTo(2.161024, 5);
  });

  test("log-rank of the two arms", () => {
    const { chiSquared, expected } = logRank(MAINTAINED, NOT_MAINTAINED);
    expect(chiSquared).toBeCloseTo(3.396389, 4);
    expect(2 * normalCdf(-Math.sqrt(chiSquared))).toBeCloseTo(0.06534, 4);
    expect(expected[0]).toBeCloseTo(10.68934, 4);
    expect(expected[1]).toBeCloseTo(7.31066, 4);
  });
});

const errors = (fit: AcceleratedLife) => fit.covariance.map((row, i) => Math.sqrt(row[i]!));

describe("accelerated life, R 4.2.2 survreg", () => {
  const aml = [
    ...MAINTAINED.map((life) => ({ ...life, x: [0] })),
    ...NOT_MAINTAINED.map((life) => ({ ...life, x: [1] })),
  ];

  test("aml, Weibull on the group", () => {
    const fit = fitAcceleratedLife(aml, "weibull")!;
    expect(fit.coefficients[0]).toBeCloseTo(4.109055, 4);
    expect(fit.coefficients[1]).toBeCloseTo(-0.929342, 4);
    expect(fit.sigma).toBeCloseTo(0.790954, 4);
    expect(fit.logLikelihood).toBeCloseTo(-80.521645, 5);
    [0.29989, 0.382502, 0.178225].forEach((se, i) => expect(errors(fit)[i]).toBeCloseTo(se, 4));
  });

  test("aml, log-normal on the group", () => {
    const fit = fitAcceleratedLife(aml, "log-normal")!;
    expect(fit.coefficients[0]).toBeCloseTo(3.578862, 4);
    expect(fit.coefficients[1]).toBeCloseTo(-0.724473, 4);
    expect(fit.sigma).toBeCloseTo(0.864702, 4);
    expect(fit.logLikelihood).toBeCloseTo(-78.927612, 5);
    [0.284686, 0.380317, 0.169506].forEach((se, i) => expect(errors(fit)[i]).toBeCloseTo(se, 4));
  });

  // R: ovarian, survreg(Surv(futime, fustat) ~ 1); independently refitted in Python.
  test("ovarian, Weibull", () => {
    const ovarian = lives(
      [
        59, 115, 156, 421, 431, 448, 464, 475, 477, 563, 638, 744, 769, 770, 803, 855, 1040, 1106,
        1129, 1206, 1227, 268, 329, 353, 365, 377,
      ],
      [1, 1, 1, 0, 1, 0, 1, 1, 0, 1, 1, 0, 0, 0, 0, 0, 0, 0, 0, 0, 0, 1, 1, 1, 1, 0],
    );
    const fit = fitAcceleratedLife(ovarian, "weibull")!;
    expect(fit.coefficients[0]).toBeCloseTo(7.111038, 4);
    expect(fit.sigma).toBeCloseTo(0.902478, 4);
    expect(fit.logLikelihood).toBeCloseTo(-97.953901, 5);
    expect(errors(fit)[0]).toBeCloseTo(0.292728, 4);
    expect(errors(fit)[1]).toBeCloseTo(0.253605, 4);
    expect(fit.covariance[0]![1]).toBeCloseTo(0.033852, 4);
  });

  test("6-MP, Weibull", () => {
    const fit = fitAcceleratedLife(SIX_MP, "weibull")!;
    expect(fit.coefficients[0]).toBeCloseTo(3.519429, 4);
    expect(fit.sigma).toBeCloseTo(0.738697, 4);
    expect(fit.logLikelihood).toBeCloseTo(-41.658678, 5);
    expect(errors(fit)[0]).toBeCloseTo(0.273369, 4);
    expect(errors(fit)[1]).toBeCloseTo(0.278398, 4);
  });

  // Lieblein & Zelen 1956, ball bearings (data from memory); published eta 81.88, beta 2.10.
  test("ball bearings, both laws", () => {
    const bearings = [
      17.88, 28.92, 33, 41.52, 42.12, 45.6, 48.4, 51.84, 51.96, 54.12, 55.56, 67.8, 68.64, 68.64,
      68.88, 84.12, 93.12, 98.64, 105.12, 105.84, 127.92, 128.04, 173.4,
    ].map((time) => ({ time, ended: true }));
    const weibull = fitAcceleratedLife(bearings, "weibull")!;
    expect(Math.exp(weibull.coefficients[0]!) / 81.87456).toBeCloseTo(1, 5);
    expect(1 / weibull.sigma / 2.101847).toBeCloseTo(1, 5);
    expect(weibull.logLikelihood).toBeCloseTo(-113.691959, 5);
    expect(lifeQuantile(weibull, 0.1) / 28.06509).toBeCloseTo(1, 5);
    const logNormal = fitAcceleratedLife(bearings, "log-normal")!;
    expect(logNormal.coefficients[0]).toBeCloseTo(4.150383, 5);
    expect(logNormal.sigma).toBeCloseTo(0.521687, 5);
    expect(lifeQuantile(logNormal, 0.5)).toBeCloseTo(Math.exp(4.150383), 3);
  });

  test("nothing to fit gives null, not a made-up law", () => {
    expect(fitAcceleratedLife([], "weibull")).toBeNull();
    expect(fitAcceleratedLife(lives([10, 20, 30], [0, 0, 1]), "weibull")).toBeNull();
    expect(fitAcceleratedLife(lives([10, 0], [1, 1]), "weibull")).toBeNull();
    expect(fitAcceleratedLife(lives([10, 10, 10], [1, 1, 1]), "log-normal")).toBeNull();
    expect(survivalSteps([])).toEqual([]);
    expect(logRank([], []).chiSquared).toBe(0);
  });
});
