/** What sources print of a circle; lengths in the unit of the points, cofactors in none. */
export type CircleFigure =
  | "centreH"
  | "centreV"
  | "radius"
  /** √(Σr²/n). */
  | "rms"
  /** Σr². */
  | "squares"
  /** Entries of (JᵀJ)⁻¹ for the centre. */
  | "cofactorHh"
  | "cofactorHv"
  | "cofactorVv";

/** An orthogonal least-squares circle in print: small enough to stand here, so that the engine can check itself anywhere. */
export interface PublishedCircle {
  readonly id: string;
  readonly source: string;
  readonly points: readonly (readonly [h: number, v: number])[];
  readonly expected: Readonly<Partial<Record<CircleFigure, number>>>;
  /** Largest difference from each figure expected: a little over half of its last printed digit. */
  readonly tolerance: Readonly<Partial<Record<CircleFigure, number>>>;
}

const nist = (file: string) =>
  `NIST Algorithm Testing and Evaluation, least-squares reference pairs (ASME B89.4.10 default test), ${file}, as quoted in zdavkeos/balyrond`;
/** NIST's fits carry more digits than the points do: within 1e-9 of the radius. */
const withinNist = (radius: number) => ({
  centreH: 1e-9 * radius,
  centreV: 1e-9 * radius,
  radius: 1e-9 * radius,
});

export const publishedCircles: readonly PublishedCircle[] = [
  {
    id: "gander-golub-strebel",
    source:
      "W. Gander, G. H. Golub, R. Strebel, BIT 34 (1994) 558, section 4; seven digits from N. Chernov's test program for geometric circle fits",
    points: [
      [1, 7],
      [2, 6],
      [5, 8],
      [7, 7],
      [9, 5],
      [3, 7],
    ],
    expected: { centreH: 4.739782, centreV: 2.983533, radius: 4.714226, rms: 0.4523271 },
    tolerance: { centreH: 6e-7, centreV: 6e-7, radius: 6e-7, rms: 6e-8 },
  },
  {
    id: "coope",
    source:
      "I. D. Coope, J. Optim. Theory Appl. 76 (1993) 381; points from public scripts, answers from memory",
    points: [
      [0.7, 4],
      [3.3, 4.7],
      [5.6, 4],
      [7.5, 1.3],
      [6.4, -1.1],
      [4.4, -3],
      [0.3, -2.5],
      [-1.1, 1.3],
    ],
    expected: { centreH: 3.04324, centreV: 0.74568, radius: 4.10586 },
    tolerance: { centreH: 6e-6, centreV: 6e-6, radius: 6e-6 },
  },
  {
    id: "scipy-cookbook",
    source:
      "SciPy Cookbook, Least squares circle, first data set (scipy/scipy-cookbook, Least_Squares_Circle.ipynb)",
    points: [
      [9, 34],
      [35, 10],
      [-13, 6],
      [10, -14],
      [23, 27],
      [0, -10],
    ],
    expected: { centreH: 10.50009, centreV: 9.65995, radius: 23.33353, squares: 7.711852, rms: 1.133715 },
    tolerance: { centreH: 6e-6, centreV: 6e-6, radius: 6e-6, squares: 6e-7, rms: 6e-7 },
  },
  {
    id: "commons-math",
    source:
      "Apache Commons Math test suite, circle fitting (apache/commons-math, AbstractLeastSquaresOptimizerAbstractTest.testCircleFitting); its centre is converged to 1e-6 only",
    points: [
      [30, 68],
      [50, -6],
      [110, -20],
      [35, 15],
      [45, 97],
    ],
    expected: {
      centreH: 96.07590211815305,
      centreV: 48.13516790438953,
      radius: 69.96016176931406,
      squares: 1.768262623567235 ** 2,
      cofactorHh: 1.839,
      cofactorHv: 0.731,
      cofactorVv: 0.786,
    },
    tolerance: {
      centreH: 1e-6,
      centreV: 1e-6,
      radius: 1e-6,
      squares: 4e-9,
      cofactorHh: 1e-3,
      cofactorHv: 1e-3,
      cofactorVv: 1e-3,
    },
  },
  {
    id: "nist-cir2d04",
    source: nist("cir2d4"),
    points: [
      [624.68116, 326.52149],
      [625.68271, 324.58693],
      [627.82036, 324.21363],
      [629.44968, 325.62746],
      [629.39723, 327.79681],
      [627.63651, 329.08331],
      [625.56132, 328.49019],
    ],
    expected: { centreH: 627.176654427197, centreV: 326.6166704860534, radius: 2.497407282279745 },
    tolerance: withinNist(2.497407282279745),
  },
  {
    id: "nist-cir2d05",
    source: nist("cir2d5"),
    points: [
      [-801.73314, -487.07313],
      [-803.07876, -487.49141],
      [-804.47036, -487.30877],
      [-805.67545, -486.60539],
      [-806.57257, -485.5461],
      [-806.99349, -484.21213],
      [-806.81178, -482.81513],
      [-806.10981, -481.61184],
      [-805.04319, -480.71372],
    ],
    expected: { centreH: -803.387605500854, centreV: -483.89835980430644, radius: 3.583336982790959 },
    tolerance: withinNist(3.583336982790959),
  },
  {
    id: "nist-cir2d08",
    source: nist("cir2d8"),
    points: [
      [-124.61539, 147.25256],
      [-127.82836, 150.27059],
      [-132.22919, 150.51569],
      [-135.75873, 147.87686],
      [-136.76179, 143.58694],
      [-134.77699, 139.65512],
      [-130.72708, 137.91441],
      [-126.50977, 139.1895],
      [-124.09859, 142.87694],
    ],
    expected: { centreH: -130.3670158388263, centreV: 144.34923095984897, radius: 6.441883188834211 },
    tolerance: withinNist(6.441883188834211),
  },
  {
    id: "nist-cir2d13",
    source: nist("cir2d13"),
    points: [
      [-129.72597, -3.6404],
      [-41.46951, -134.86389],
      [88.86212, -45.37],
      [0.32312, 83.50213],
    ],
    expected: { centreH: -20.653367571511815, centreV: -25.664945094397115, radius: 111.2193970261302 },
    tolerance: withinNist(111.2193970261302),
  },
  {
    id: "nist-cir2d16",
    source: nist("cir2d16"),
    points: [
      [-495.10298, -256.71324],
      [-482.0437, -269.48596],
      [-463.91281, -267.23694],
      [-454.37411, -251.65384],
      [-460.60945, -234.48887],
      [-477.90962, -228.66262],
      [-493.26078, -238.55044],
    ],
    expected: { centreH: -475.3143729117457, centreV: -249.54625026080407, radius: 21.04595450666277 },
    tolerance: withinNist(21.04595450666277),
  },
];
