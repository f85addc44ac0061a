import { spawnSync } from "node:child_process";
import { fileURLToPath } from "node:url";
import { levenbergMarquardt } from "ml-levenberg-marquardt";
import { Matrix, QrDecomposition } from "ml-matrix";
import type { PointsInput } from "../../server/compute/bore/bore-input.ts";
import { fitBore } from "../../server/compute/bore/fit-bore.ts";
import { solvePlainCircle, startPlainCircle } from "../../server/compute/bore/plain-circle.ts";
import { gatherWall } from "../../server/compute/bore/wall-readings.ts";
import { ring, shuffled, type WallPoint } from "./ring.ts";
import { microsecondsOf } from "./time-it.ts";

interface ByScipy {
  readonly microseconds: number;
  readonly centre: readonly [number, number];
}

const sizes = [24, 360, 1_000, 10_000];
const notTimed = "not timed";

/** Least squares circles: the engine, and general-purpose libraries on the same points in the same run. */
export function timeCircleFits(): void {
  const rings = sizes.map((size) => ring(size));
  const scipy = byScipy(rings);
  const engine = rings.map((points) => timeEngine(points));
  printEngine(engine);
  printRatios(rings, engine, scipy);
}

interface EngineTimes {
  readonly points: number;
  readonly kernel: number;
  readonly fit: number;
  readonly shuffledFit: number;
}

/** The fit of the columns alone, and all of `fitBore`, with the readings once in clock order and once in none. */
function timeEngine(points: readonly WallPoint[]): EngineTimes {
  const input = inputOf(points);
  const other = inputOf(shuffled(points));
  const { readings } = gatherWall(input);
  return {
    points: points.length,
    kernel: microsecondsOf(() => {
      const start = startPlainCircle(readings);
      return start && solvePlainCircle(readings, start);
    }),
    fit: microsecondsOf(() => fitBore(input)),
    shuffledFit: microsecondsOf(() => fitBore(other)),
  };
}

/** Time for a thousand points shows whether the whole grows as their number does. */
function printEngine(engine: readonly EngineTimes[]): void {
  console.log("\nLeast squares circle, this engine (fitBore: covariance, residuals, arc coverage, warnings)");
  console.log("points   kernel µs   fitBore µs   in any order µs   fitBore µs per 1,000 points");
  for (const { points, kernel, fit, shuffledFit } of engine) {
    console.log(
      [
        String(points).padStart(6),
        kernel.toFixed(2).padStart(11),
        fit.toFixed(2).padStart(12),
        shuffledFit.toFixed(2).padStart(17),
        ((fit / points) * 1_000).toFixed(1).padStart(29),
      ].join(" "),
    );
  }
  const perPoint = (points: number) => (engine.find((each) => each.points === points)?.fit ?? NaN) / points;
  const growth = perPoint(10_000) / perPoint(1_000);
  console.log(`A point of 10,000 takes ${growth.toFixed(2)} times as long as one of 1,000: 1 is linear.`);
}

/** How many times as long the libraries take for their bare fit as the engine for all of `fitBore`. */
function printRatios(
  rings: readonly (readonly WallPoint[])[],
  engine: readonly EngineTimes[],
  scipy: readonly ByScipy[] | null,
): void {
  console.log("\nThe same circles by libraries, as multiples of fitBore");
  console.log(
    "points   scipy LM   ml-matrix QR   ml-levenberg-marquardt   scipy LM ÷ kernel   same centre to",
  );
  for (const [k, points] of rings.entries()) {
    const { kernel, fit } = engine[k]!;
    const other = scipy?.[k];
    const ratio = (microseconds: number | undefined, to = fit) =>
      microseconds === undefined ? notTimed : (microseconds / to).toFixed(1);
    const { centre } = fitBore(inputOf(points));
    const apart = other ? Math.hypot(centre.hMm - other.centre[0], centre.vMm - other.centre[1]) : null;
    console.log(
      [
        String(points.length).padStart(6),
        ratio(other?.microseconds).padStart(10),
        ratio(microsecondsOf(() => circleByQr(points))).padStart(14),
        ratio(
          points.length > 1_000 ? undefined : microsecondsOf(() => circleByLevenbergMarquardt(points)),
        ).padStart(24),
        ratio(other?.microseconds, kernel).padStart(19),
        (apart === null ? "-" : `${apart.toExponential(1)} mm`).padStart(16),
      ].join(" "),
    );
  }
  if (scipy === null) console.log("scipy is not installed: Debian's package is python3-scipy.");
}

export function inputOf(points: readonly WallPoint[]): PointsInput {
  return {
    form: "points",
    points: points.map(({ h, v }) => ({ hMm: h, vMm: v, zMm: null, uMm: null })),
    readingUncertaintyMm: 0.004,
    nominalDiameterMm: null,
    taper: null,
    outliers: null,
    seen: "downstream",
    level: 0.95,
  };
}

function byScipy(rings: readonly (readonly WallPoint[])[]): readonly ByScipy[] | null {
  const script = fileURLToPath(new URL("circle-by-scipy.py", import.meta.url));
  const input = JSON.stringify(rings.map((points) => points.map(({ h, v }) => [h, v])));
  // Debian's own interpreter is the one that Debian's python3-scipy belongs to.
  const { status, stdout } = spawnSync("/usr/bin/python3", [script], { input, encoding: "utf8" });
  return status === 0 ? (JSON.parse(stdout) as ByScipy[]) : null;
}

/** Gauss–Newton with the QR decomposition of ml-matrix, to the same tolerance as the engine. */
function circleByQr(points: readonly WallPoint[]): readonly number[] {
  const mean = (of: (point: WallPoint) => number) =>
    points.reduce((sum, point) => sum + of(point), 0) / points.length;
  let unknowns = [mean(({ h }) => h), mean(({ v }) => v), 200];
  for (let iteration = 0; iteration < 20; iteration++) {
    const [h0 = 0, v0 = 0, radius = 0] = unknowns;
    const jacobian = new Matrix(points.length, 3);
    const residuals = new Matrix(points.length, 1);
    for (const [k, { h, v }] of points.entries()) {
      const distance = Math.hypot(h - h0, v - v0);
      jacobian.setRow(k, [(h - h0) / distance, (v - v0) / distance, 1]);
      residuals.set(k, 0, distance - radius);
    }
    const step = new QrDecomposition(jacobian).solve(residuals).to1DArray();
    unknowns = unknowns.map((value, k) => value + (step[k] ?? 0));
    if (Math.hypot(...step) < 1e-10) break;
  }
  return unknowns;
}

/** The library fits y = f(x): here 0 = distance from the circle, at the index of each point. */
function circleByLevenbergMarquardt(points: readonly WallPoint[]): readonly number[] {
  const { parameterValues } = levenbergMarquardt(
    { x: points.map((_, k) => k), y: points.map(() => 0) },
    ([h0 = 0, v0 = 0, radius = 0]) =>
      (k) => {
        const { h, v } = points[k] ?? { h: 0, v: 0 };
        return Math.hypot(h - h0, v - v0) - radius;
      },
    { initialValues: [0, 0, 200], gradientDifference: 1e-6, errorTolerance: 1e-12, maxIterations: 50 },
  );
  return parameterValues;
}
