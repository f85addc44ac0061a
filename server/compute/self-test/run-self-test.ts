import { circleCases } from "./circle-cases.ts";
import { criterionCases } from "./criterion-cases.ts";
import { factorCases } from "./factor-cases.ts";
import { lineCases } from "./line-cases.ts";
import { moveCases } from "./move-cases.ts";
import { optimalAxisCases } from "./optimal-axis-cases.ts";
import { sagCases } from "./sag-cases.ts";
import { scatterCases } from "./scatter-cases.ts";
import type { SelfCase } from "./self-case.ts";
import { targetCases } from "./target-cases.ts";

export interface CheckedFigure {
  readonly id: string;
  readonly area: SelfCase["area"];
  readonly source: string;
  readonly figure: string;
  readonly expected: number;
  /** Null when the engine refused or gave no finite number. */
  readonly got: number | null;
  readonly tolerance: number;
  readonly passed: boolean;
}

export const selfCases: readonly SelfCase[] = [
  ...circleCases,
  ...criterionCases,
  ...lineCases,
  ...optimalAxisCases,
  ...moveCases,
  ...targetCases,
  ...sagCases,
  ...scatterCases,
  ...factorCases,
];

/** Computes every shipped published case anew and holds each printed figure against what comes out. */
export function runSelfTest(cases: readonly SelfCase[] = selfCases): CheckedFigure[] {
  return cases.flatMap(({ id, area, source, figures, compute }) => {
    const computed = attempt(compute);
    return figures.map(({ figure, expected, tolerance }) => {
      const got = computed[figure];
      const finite = got !== undefined && Number.isFinite(got) ? got : null;
      const passed = finite !== null && Math.abs(finite - expected) <= tolerance;
      return { id, area, source, figure, expected, got: finite, tolerance, passed };
    });
  });
}

/** A case that the engine refuses fails: it does not end the test of the others. */
function attempt(compute: SelfCase["compute"]): Readonly<Record<string, number>> {
  try {
    return compute();
  } catch {
    return {};
  }
}
