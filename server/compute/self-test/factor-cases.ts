import { chiSquareQuantile } from "../statistics/chi-square.ts";
import { radialFactor } from "../statistics/radial-factor.ts";
import { studentFactor } from "../statistics/student-t.ts";
import type { SelfCase } from "./self-case.ts";

/** Half of the last of two, or three, printed decimals, and a hair for its own binary form. */
const twoDecimals = 0.005 + 1e-12;
const threeDecimals = 0.0005 + 1e-12;

/** JCGM 100:2008 (GUM), Table G.2, t_p(ν) for p = 0.95. */
const studentTable: readonly (readonly [dof: number, factor: number])[] = [
  [1, 12.71],
  [2, 4.3],
  [3, 3.18],
  [5, 2.57],
  [10, 2.23],
  [20, 2.09],
  [50, 2.01],
  [100, 1.984],
];

/** NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.4, upper critical values of chi-square, 0.95. */
const chiSquareTable: readonly (readonly [dof: number, quantile: number])[] = [
  [1, 3.841],
  [2, 5.991],
  [5, 11.07],
  [10, 18.307],
  [30, 43.773],
];

export const factorCases: readonly SelfCase[] = [
  {
    id: "factors-student",
    area: "statistics",
    source: "JCGM 100:2008 (GUM), Table G.2, fraction 95 %",
    figures: studentTable.map(([dof, expected]) => ({
      figure: `t(${dof})`,
      expected,
      tolerance: dof === 100 ? threeDecimals : twoDecimals,
    })),
    compute: () => Object.fromEntries(studentTable.map(([dof]) => [`t(${dof})`, studentFactor(0.95, dof)])),
  },
  {
    id: "factors-chi-square",
    area: "statistics",
    source: "NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.4, 0.95 (from memory)",
    figures: chiSquareTable.map(([dof, expected]) => ({
      figure: `chiSquare(${dof})`,
      expected,
      tolerance: threeDecimals,
    })),
    compute: () =>
      Object.fromEntries(chiSquareTable.map(([dof]) => [`chiSquare(${dof})`, chiSquareQuantile(0.95, dof)])),
  },
  {
    id: "factors-radial",
    area: "statistics",
    source: "Closed form of the circular normal distribution: √(−2·ln 0.05) = 2.4477",
    figures: [{ figure: "k2", expected: 2.4477, tolerance: 0.00005 }],
    compute: () => ({ k2: radialFactor(0.95, null) }),
  },
];
