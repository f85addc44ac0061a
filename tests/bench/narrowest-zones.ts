import { spawnSync } from "node:child_process";
import { fileURLToPath } from "node:url";
import { fitByCriterion } from "../../server/compute/bore/fit-criterion.ts";
import { fitBore } from "../../server/compute/bore/fit-bore.ts";
import { seededRandom } from "../support/seeded-random.ts";
import { inputOf } from "./circle-fits.ts";
import { solveByHighs } from "./linear-program.ts";
import type { WallPoint } from "./ring.ts";
import { microsecondsOf, timeOnce } from "./time-it.ts";

interface ByScipy {
  readonly microseconds: number;
  readonly width: number;
}

/** Readings of 0.01 mm of scatter on an arc of a bore of 200 mm. */
function arc(overDeg: number, seed: number, count = 360): WallPoint[] {
  const random = seededRandom(seed);
  return Array.from({ length: count }, (_, k) => {
    const angle = ((overDeg * Math.PI) / 180) * (k / (overDeg < 360 ? count - 1 : count));
    const radius = 100 + 0.01 * random.normal();
    return { h: 3 + radius * Math.cos(angle), v: -7 + radius * Math.sin(angle) };
  });
}

/**
 * The narrowest zone of 360 points: the engine's answer, best of all centres; and two local searches from the
 * least-squares centre, which prove nothing: scipy's SLSQP, and linear programs of tangents by HiGHS.
 */
export function timeNarrowestZones(): void {
  const sets = [
    ["whole ring", arc(360, 1)],
    ["120 degrees", arc(120, 1)],
    ["20 degrees", arc(20, 1)],
    ["20 degrees, another", arc(20, 3)],
  ] as const;
  const scipy = byScipy(sets.map(([, points]) => points));
  console.log(
    "\nMinimum zone of 360 points; scipy SLSQP and HiGHS search near the least-squares centre only",
  );
  console.log(
    "readings on           engine ms   SLSQP ÷ engine   HiGHS ÷ engine   widths above the engine's, mm",
  );
  for (const [k, [name, points]] of sets.entries()) {
    const input = inputOf(points);
    const engine = microsecondsOf(() => fitByCriterion(input, "minimum_zone"), 30);
    const { roundnessMm } = fitByCriterion(input, "minimum_zone");
    const start = fitBore(input).centre;
    const highs = timeOnce(() => zoneByTangents(points, [start.hMm, start.vMm]));
    const other = scipy?.[k];
    const above = [other?.width, highs.result].map((width) =>
      width === undefined ? "not timed" : (width - roundnessMm).toExponential(1),
    );
    console.log(
      [
        name.padEnd(21),
        (engine / 1000).toFixed(2).padStart(9),
        (other ? (other.microseconds / engine).toFixed(1) : "not timed").padStart(16),
        ((highs.seconds * 1e6) / engine).toFixed(0).padStart(16),
        above.join(" and ").padStart(31),
      ].join(" "),
    );
  }
}

function byScipy(sets: readonly (readonly WallPoint[])[]): readonly ByScipy[] | null {
  const script = fileURLToPath(new URL("zone-by-scipy.py", import.meta.url));
  const input = JSON.stringify(sets.map((points) => points.map(({ h, v }) => [h, v])));
  // Debian's own interpreter is the one that Debian's python3-scipy belongs to.
  const { status, stdout } = spawnSync("/usr/bin/python3", [script], { input, encoding: "utf8" });
  return status === 0 ? (JSON.parse(stdout) as ByScipy[]) : null;
}

/** Step by step to the least outer − inner of the tangents of all distances, in a box that shrinks when they mislead. */
function zoneByTangents(points: readonly WallPoint[], start: readonly [number, number]): number {
  const distancesFrom = ([h0, v0]: readonly [number, number]) =>
    points.map(({ h, v }) => Math.hypot(h - h0, v - v0));
  const widthAt = (centre: readonly [number, number]) => {
    const distances = distancesFrom(centre);
    return Math.max(...distances) - Math.min(...distances);
  };
  let [centre, width, reach] = [start, widthAt(start), 1];
  for (let step = 0; step < 60 && reach > 1e-11; step++) {
    const distances = distancesFrom(centre);
    const rows = points.flatMap(({ h, v }, i) => {
      const distance = distances[i] ?? NaN;
      const terms = { dh: (centre[0] - h) / distance, dv: (centre[1] - v) / distance };
      return [
        { terms: { ...terms, outer: -1 }, is: "<=", value: -distance },
        { terms: { ...terms, inner: -1 }, is: ">=", value: -distance },
      ] as const;
    });
    const box = ["dh", "dv"].flatMap(
      (name) =>
        [
          { terms: { [name]: 1 }, is: "<=", value: reach },
          { terms: { [name]: 1 }, is: ">=", value: -reach },
        ] as const,
    );
    const program = {
      least: { outer: 1, inner: -1 },
      rows: [...rows, ...box],
      free: ["dh", "dv"],
      whole: {},
    };
    const { dh = 0, dv = 0 } = solveByHighs(program, 20).values;
    const next = [centre[0] + dh, centre[1] + dv] as const;
    const nextWidth = widthAt(next);
    if (nextWidth < width) [centre, width, reach] = [next, nextWidth, 2 * reach];
    else reach = Math.min(reach, Math.max(Math.abs(dh), Math.abs(dv))) / 4;
  }
  return width;
}
