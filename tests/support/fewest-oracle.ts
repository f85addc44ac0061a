import loadHighs from "highs";
import type { Plane } from "../../server/compute/moves/move-problem.ts";
import type { PlaneVector } from "../../server/compute/plane.ts";
import type { FewestMovesProblem } from "../../server/compute/fewest-moves/fewest-moves-problem.ts";

const highs = await loadHighs();

/** Sides of the polygons that stand for round tolerances. */
const sides = 180;

export interface OracleChoice {
  readonly ids: readonly string[];
  readonly cost: number;
}

type Polygon = "outside" | "inside";

/**
 * The cheapest sets of parts, found by trying every set in the order of its cost: whether axis and moves exist for it
 * is a linear program (HiGHS) in the raw heights of the axis at the two reference stations and the shift and slope of each
 * part, written here from the problem alone. Round tolerances are polygons round the circle (`outside`) or in it. All
 * sets at the least cost; null where none does. Uncertainty aside. Supports rest on feet; a station follows its part and all that carry it.
 */
export function cheapestSets(problem: FewestMovesProblem, polygon: Polygon): readonly OracleChoice[] | null {
  const free = problem.components.filter(({ fixed }) => !fixed);
  const sets = Array.from({ length: 2 ** free.length }, (_, bits) => {
    const chosen = free.filter((_part, k) => (bits >> k) % 2 === 1);
    return { ids: chosen.map(({ id }) => id), cost: chosen.reduce((sum, { cost }) => sum + cost, 0) };
  }).sort((a, b) => a.cost - b.cost);
  const does = ({ ids }: OracleChoice) => leastOf(problem, ids, polygon, null) !== null;
  const first = sets.find(does);
  return first ? sets.filter((set) => Math.abs(set.cost - first.cost) < 1e-9 && does(set)) : null;
}

/**
 * What Σ(|d|/T)² of the parts in `ids` can still lose at most, from the deviations given: a convex sum lies above its
 * tangent plane, whose least over all axes and moves is a linear program (the gap of M. Frank and P. Wolfe, Naval Research
 * Logistics Quarterly 3 (1956) 95–110, from memory).
 */
export function gapOfSum(
  problem: FewestMovesProblem,
  ids: readonly string[],
  deviations: readonly PlaneVector[],
): number {
  const gradient = problem.stations.map(({ tolerance }, k) => {
    const slope = (plane: Plane, value: number) => {
      if (!tolerance) return 0;
      if (tolerance.form === "radial") return (2 * value) / tolerance.halfWidthMm ** 2;
      const { minMm, maxMm } = tolerance[plane];
      return (8 * (value - (minMm + maxMm) / 2)) / (maxMm - minMm) ** 2;
    };
    const { hMm, vMm } = deviations[k]!;
    return { h: slope("h", hMm), v: slope("v", vMm) };
  });
  const here = gradient.reduce(
    (sum, { h, v }, k) => sum + h * deviations[k]!.hMm + v * deviations[k]!.vMm,
    0,
  );
  return here - leastOf(problem, ids, "outside", gradient)!;
}

type Terms = Readonly<Record<string, number>>;

const text = (terms: Terms): string =>
  Object.entries(terms)
    .map(([name, factor]) => `${factor < 0 ? "-" : "+"} ${Math.abs(factor)} ${name}`)
    .join(" ");

/** The least of a linear form of all deviations (per mm), or 0 where none is given; null when nothing is within the limits. */
function leastOf(
  problem: FewestMovesProblem,
  ids: readonly string[],
  polygon: Polygon,
  form: readonly Readonly<Record<Plane, number>>[] | null,
): number | null {
  const rows: string[] = [];
  const free: string[] = [];
  const asked: Record<string, number> = {};
  for (const plane of ["h", "v"] as const) {
    problem.references.forEach(({ float }, k) => {
      free.push(`a${plane}${k}`);
      rows.push(...between({ [`a${plane}${k}`]: 1 }, float[plane]));
    });
    ids.forEach((id, p) => {
      const { supports } = problem.components.find((component) => component.id === id)!;
      free.push(`m${plane}${p}`, `t${plane}${p}`);
      if (supports.length === 1) rows.push(`t${plane}${p} = 0`);
      for (const { zMm, travel } of supports) {
        const slope = (zMm - supports[0]!.zMm) / 1e3;
        rows.push(...between({ [`m${plane}${p}`]: 1, [`t${plane}${p}`]: slope }, travel[plane]));
      }
    });
  }
  problem.stations.forEach((station, k) => {
    const { tolerance, deviation } = station;
    if (!tolerance) return;
    for (const plane of ["h", "v"] as const) {
      free.push(`d${plane}${k}`);
      const off = 1e3 * (plane === "h" ? deviation.hMm : deviation.vMm);
      rows.push(`${text({ [`d${plane}${k}`]: 1, ...shares(problem, ids, station.id, plane) })} = ${off}`);
      if (tolerance.form === "planes") rows.push(...between({ [`d${plane}${k}`]: 1 }, tolerance[plane]));
      asked[`d${plane}${k}`] = form ? form[k]![plane] : 0;
    }
    if (tolerance.form === "radial") {
      const radius = 1e3 * tolerance.halfWidthMm * (polygon === "inside" ? Math.cos(Math.PI / sides) : 1);
      for (let s = 0; s < sides; s++) {
        const angle = (2 * Math.PI * s) / sides;
        rows.push(`${text({ [`dh${k}`]: Math.sin(angle), [`dv${k}`]: Math.cos(angle) })} <= ${radius}`);
      }
    }
  });
  const { Status, ObjectiveValue } = highs.solve(
    `Minimize\n obj: ${text(asked)}\nSubject To\n${rows.map((row, k) => ` c${k}: ${row}`).join("\n")}\nBounds\n${free.map((name) => ` ${name} free`).join("\n")}\nEnd\n`,
    { output_flag: false },
  );
  if (Status === "Infeasible") return null;
  if (Status !== "Optimal") throw new Error(`The oracle ended as ${Status}.`);
  return ObjectiveValue / 1e3;
}

/** Axis less move at a station: what is added to its deviation after them to give the one found. */
function shares(problem: FewestMovesProblem, ids: readonly string[], stationId: string, plane: Plane): Terms {
  const { stations, references, components } = problem;
  const zOf = (id: string) => stations.find((station) => station.id === id)!.zMm;
  const [from, to] = references.map((reference) => zOf(reference.stationId));
  const share = (zOf(stationId) - from!) / (to! - from!);
  const terms: Record<string, number> = { [`a${plane}0`]: 1 - share, [`a${plane}1`]: share };
  let part = components.find(({ stationIds }) => stationIds.includes(stationId));
  while (part) {
    const { id, supports, carriedById } = part;
    const p = ids.indexOf(id);
    if (p >= 0) {
      terms[`m${plane}${p}`] = -1;
      terms[`t${plane}${p}`] = (supports[0]!.zMm - zOf(stationId)) / 1e3;
    }
    part = components.find((each) => each.id === carriedById);
  }
  return terms;
}

function between(
  terms: Terms,
  { minMm, maxMm }: { readonly minMm: number; readonly maxMm: number },
): string[] {
  return [
    ...(Number.isFinite(minMm) ? [`${text(terms)} >= ${1e3 * minMm}`] : []),
    ...(Number.isFinite(maxMm) ? [`${text(terms)} <= ${1e3 * maxMm}`] : []),
  ];
}
