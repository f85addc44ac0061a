import type { AxisInput } from "../../server/compute/axis/axis-input.ts";
import { deviationsFromAxis } from "../../server/compute/axis/deviations-from-axis.ts";
import { seededRandom } from "../support/seeded-random.ts";
import { solveByHighs, type Program } from "./linear-program.ts";
import { microsecondsOf } from "./time-it.ts";

/** The axis of the least largest deviation in each plane: the engine's whole answer, and the two linear programs alone. */
export function timeBestAxes(): void {
  console.log(
    "\nAxis by minimum_zone in planes, with deviations and covariance; HiGHS: its two linear programs",
  );
  console.log("stations   engine µs   HiGHS µs   HiGHS ÷ engine   same zone to");
  for (const count of [8, 20, 200]) {
    const input = stationsOf(count);
    const programs = (["hMm", "vMm"] as const).map((plane) => programOf(input, plane));
    const byEngine = microsecondsOf(() => deviationsFromAxis(input), 20);
    const byHighs = microsecondsOf(() => programs.map((program) => solveByHighs(program, 20)), 20);
    const { optimum } = deviationsFromAxis(input).axis;
    const zones = optimum?.zone === "planes" ? [optimum.h.objectiveMm, optimum.v.objectiveMm] : [];
    const apart = programs.map((program, k) =>
      Math.abs((solveByHighs(program, 20).values["most"] ?? NaN) - (zones[k] ?? NaN)),
    );
    console.log(
      [
        String(count).padStart(8),
        byEngine.toFixed(0).padStart(11),
        byHighs.toFixed(0).padStart(10),
        (byHighs / byEngine).toFixed(1).padStart(16),
        `${Math.max(...apart).toExponential(1)} mm`.padStart(14),
      ].join(" "),
    );
  }
}

function stationsOf(count: number): AxisInput {
  const random = seededRandom(count);
  const stations = Array.from({ length: count }, (_, k) => ({
    zMm: 400 * k,
    centre: { hMm: 0.3 + 2e-5 * k + 0.1 * random.normal(), vMm: -0.2 + 0.1 * random.normal() },
    covariance: null,
    dof: null,
    target: { hMm: 0, vMm: 0 },
    targetUncertainty: { hMm: 0, vMm: 0 },
    tolerance: null,
  }));
  const reference = stations.map((_, index) => index);
  return { method: "minimum_zone", zone: "planes", reference, stations, level: 0.95, rule: "guarded" };
}

/** Least `most` with |observed − at0 − slope·z| ≤ most; z in metres, so that both unknowns are of one size. */
function programOf({ stations }: AxisInput, plane: "hMm" | "vMm"): Program {
  return {
    least: { most: 1 },
    rows: stations.flatMap(({ zMm, centre }) => {
      const terms = { at0: 1, slope: zMm / 1000 };
      return [
        { terms: { ...terms, most: 1 }, is: ">=", value: centre[plane] },
        { terms: { ...terms, most: -1 }, is: "<=", value: centre[plane] },
      ] as const;
    }),
    free: ["at0", "slope"],
    whole: {},
  };
}
