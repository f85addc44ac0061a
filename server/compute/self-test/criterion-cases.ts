import type { PointsInput } from "../bore/bore-input.ts";
import { fitByCriterion, type CriterionMethod } from "../bore/fit-criterion.ts";
import { localFrameOf } from "../bore/local-frame.ts";
import { solveEllipse } from "../bore/solve-ellipse.ts";
import type { SelfCase, SelfFigure } from "./self-case.ts";

type Pair = readonly [h: number, v: number];

const inputOf = (points: readonly Pair[]): PointsInput => ({
  form: "points",
  points: points.map(([hMm, vMm]) => ({ hMm, vMm, zMm: null, uMm: null })),
  readingUncertaintyMm: null,
  nominalDiameterMm: null,
  taper: null,
  outliers: null,
  seen: "downstream",
  level: 0.95,
});

function circleBy(method: CriterionMethod, points: readonly Pair[]) {
  const { centre, diameterMm, roundnessMm } = fitByCriterion(inputOf(points), method);
  return { h: centre.hMm, v: centre.vMm, radius: (diameterMm ?? Number.NaN) / 2, width: roundnessMm };
}

/** Centre and size of the points by each limiting criterion. */
function limitingFigures(points: readonly Pair[]): Readonly<Record<string, number>> {
  const zone = circleBy("minimum_zone", points);
  const outer = circleBy("minimum_circumscribed", points);
  const inner = circleBy("maximum_inscribed", points);
  return {
    zoneCentreH: zone.h,
    zoneCentreV: zone.v,
    zoneWidth: zone.width,
    zoneMeanRadius: zone.radius,
    circumscribedCentreH: outer.h,
    circumscribedCentreV: outer.v,
    circumscribedRadius: outer.radius,
    inscribedCentreH: inner.h,
    inscribedCentreV: inner.v,
    inscribedRadius: inner.radius,
  };
}

const figuresWithin = (expected: Readonly<Record<string, number>>, tolerance: number): SelfFigure[] =>
  Object.entries(expected).map(([figure, value]) => ({ figure, expected: value, tolerance }));

function circumscribed(
  id: string,
  source: string,
  points: readonly Pair[],
  [centreH, centreV, radius]: readonly [number, number, number],
  [centreWithin, radiusWithin]: readonly [number, number],
): SelfCase {
  return {
    id: `circumscribed-${id}`,
    area: "bore-fit",
    source,
    figures: [
      { figure: "centreH", expected: centreH, tolerance: centreWithin },
      { figure: "centreV", expected: centreV, tolerance: centreWithin },
      { figure: "radius", expected: radius, tolerance: radiusWithin },
    ],
    compute: () => {
      const { h, v, radius: got } = circleBy("minimum_circumscribed", points);
      return { centreH: h, centreV: v, radius: got };
    },
  };
}

/** Six points at equal angles, alternately 50.25 and 49.75 from the origin. */
const alternating: readonly Pair[] = Array.from({ length: 6 }, (_, k): Pair => {
  const radius = k % 2 === 0 ? 50.25 : 49.75;
  return [radius * Math.cos((k * Math.PI) / 3), radius * Math.sin((k * Math.PI) / 3)];
});

const nistRing: readonly Pair[] = [
  [-124.61539, 147.25256],
  [-127.82836, 150.27059],
  [-132.22919, 150.51569],
  [-135.75873, 147.87686],
  [-136.76179, 143.58694],
  [-134.77699, 139.65512],
  [-130.72708, 137.91441],
  [-126.50977, 139.1895],
  [-124.09859, 142.87694],
];

const ganderPoints: readonly Pair[] = [
  [1, 7],
  [2, 6],
  [5, 8],
  [7, 7],
  [9, 5],
  [3, 7],
  [6, 2],
  [8, 4],
];

/** The fit alone: these readings lie on 147° of the ellipse, of which a bore's answer is refused. */
function ganderEllipse(): Readonly<Record<string, number>> {
  const readings = {
    hMm: ganderPoints.map(([h]) => h),
    vMm: ganderPoints.map(([, v]) => v),
    zMm: null,
    uMm: null,
  };
  const fit = solveEllipse(readings, localFrameOf(readings, null), null, "points");
  return {
    centreH: fit.centre.hMm,
    centreV: fit.centre.vMm,
    semiMajor: fit.majorMm,
    semiMinor: fit.minorMm,
    angle: fit.axisRad,
    squares: fit.residualsMm.reduce((sum, residual) => sum + residual * residual, 0),
  };
}

/** Twelve points exactly on an ellipse with semi-axes of 50.3 and 49.9, the major one at 2 o'clock. */
function exactOval(): Readonly<Record<string, number>> {
  const [cos, sin] = [Math.cos(Math.PI / 6), Math.sin(Math.PI / 6)];
  const points = Array.from({ length: 12 }, (_, k): Pair => {
    const [x, y] = [50.3 * Math.cos((k * Math.PI) / 6), 49.9 * Math.sin((k * Math.PI) / 6)];
    return [7 + x * cos - y * sin, -3 + x * sin + y * cos];
  });
  const { centre, diameterMm, ellipse } = fitByCriterion(inputOf(points), "ellipse");
  return {
    centreH: centre.hMm,
    centreV: centre.vMm,
    meanDiameter: diameterMm ?? Number.NaN,
    ovality: ellipse?.ovalityMm ?? Number.NaN,
  };
}

/** Bores by the criteria other than least squares. */
export const criterionCases: readonly SelfCase[] = [
  circumscribed(
    "four-points",
    "Smallest circle round four points, test case in print at Code Golf Stack Exchange, two decimals",
    [
      [-8, 0],
      [3, 1],
      [-6.2, -8],
      [3, 9.5],
    ],
    [-1.6, 0.75, 9.89],
    [0.006, 0.006],
  ),
  circumscribed(
    "square-and-corner",
    "e-olymp, problem 1040, minimal circle, sample output: radius 1.41",
    [
      [0, 0],
      [0, 1],
      [1, 0],
      [1, 1],
      [2, 2],
    ],
    [1, 1, 1.41],
    [1e-9, 0.005],
  ),
  circumscribed(
    "pythagorean",
    "Closed form: (3, 4), (−3, 4), (5, 0), (−4, −3) lie on h² + v² = 25, and their triangles hold the origin",
    [
      [3, 4],
      [-3, 4],
      [5, 0],
      [-4, -3],
      [0, 4],
      [1, 1],
    ],
    [0, 0, 5],
    [1e-12, 1e-12],
  ),
  {
    id: "limiting-alternating",
    area: "bore-fit",
    source:
      "Closed form: points alternately on two concentric circles, 50.25 and 49.75; by the alternation of their contacts these are the zone (ISO 12181-1), and both limiting circles",
    figures: figuresWithin(
      {
        zoneCentreH: 0,
        zoneCentreV: 0,
        zoneWidth: 0.5,
        zoneMeanRadius: 50,
        circumscribedCentreH: 0,
        circumscribedCentreV: 0,
        circumscribedRadius: 50.25,
        inscribedCentreH: 0,
        inscribedCentreV: 0,
        inscribedRadius: 49.75,
      },
      1e-11,
    ),
    compute: () => limitingFigures(alternating),
  },
  {
    id: "limiting-nist-cir2d08",
    area: "bore-fit",
    source:
      "Points of NIST Algorithm Testing and Evaluation, least-squares reference pairs, cir2d8, as quoted in zdavkeos/balyrond; the limiting circles, not in print, by exhaustion of all pairs and triples of contacts",
    figures: figuresWithin(
      {
        zoneCentreH: -130.36760242891836,
        zoneCentreV: 144.34822018326926,
        zoneWidth: 0.004498527209458469,
        zoneMeanRadius: (6.443844939044559 + 6.439346411835101) / 2,
        circumscribedCentreH: -130.3671383522505,
        circumscribedCentreV: 144.34807403388714,
        circumscribedRadius: 6.44372492357623,
        inscribedCentreH: -130.36745408010552,
        inscribedCentreV: 144.3508660574759,
        inscribedRadius: 6.439807052835015,
      },
      1e-9,
    ),
    compute: () => limitingFigures(nistRing),
  },
  {
    id: "ellipse-gander-golub-strebel",
    area: "bore-fit",
    source:
      "W. Gander, G. H. Golub, R. Strebel, BIT 34 (1994) 558, geometric ellipse through eight points, as quoted in the tests of conicfit (CRAN)",
    figures: [
      ...figuresWithin({ centreH: 2.6996, centreV: 3.816, semiMajor: 6.5187, semiMinor: 3.0319 }, 6e-5),
      { figure: "angle", expected: 0.3596, tolerance: 6e-5 },
      { figure: "squares", expected: 1.373306, tolerance: 6e-7 },
    ],
    compute: ganderEllipse,
  },
  {
    id: "ellipse-exact",
    area: "bore-fit",
    source: "Closed form: twelve points on an ellipse with semi-axes of 50.3 and 49.9",
    figures: figuresWithin({ centreH: 7, centreV: -3, meanDiameter: 100.2, ovality: 0.8 }, 1e-11),
    compute: exactOval,
  },
];
