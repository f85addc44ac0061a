import type { Method } from "../method.ts";

const iso12181 = "ISO 12181-1";

/** The five criteria of a bore. */
export const circleCriteria: readonly Method[] = [
  {
    id: "least-squares",
    title: "Least squares (LSCI)",
    asked: "method: least_squares",
    says: [
      "Orthogonal: the distances from the wall itself are made small, not an algebraic stand-in for them. Newton's method with the full second derivative from Taubin's circle, until a step changes the residuals by rounding only. It is weighted by the stated uncertainties, and the default.",
    ],
    formulas: ["minimise Σ w_i · (|p_i − c| − R)²", "w_i = 1/u_i²"],
    where: [
      ["p_i", "a point on the wall"],
      ["c, R", "centre and radius"],
      ["u_i", "standard uncertainty of the reading; all weights 1 where none is stated"],
    ],
    sources: [
      iso12181,
      "G. Taubin, IEEE Trans. PAMI 13 (1991) 1115",
      "N. Chernov, Circular and Linear Regression (2010), section 5.10",
    ],
  },
  {
    id: "minimum-zone",
    title: "Minimum zone (MZCI)",
    asked: "method: minimum_zone",
    says: [
      "The two concentric circles closest together that hold all readings between them. The diameter answered is their mean, the roundness their distance. Every centre is compared by branch and bound, far ones and straight strips included: no local search decides. At least four contacts, outer and inner ones by turns, prove it a local optimum besides.",
      "A zone no narrower than a straight strip is refused as `arc_too_flat`. Another centre as good within the reading uncertainty is a warning.",
    ],
    formulas: ["minimise max |p_i − c| − min |p_i − c|"],
    where: [],
    sources: [iso12181],
  },
  {
    id: "maximum-inscribed",
    title: "Maximum inscribed (MICI)",
    asked: "method: maximum_inscribed",
    says: [
      "The largest circle with no reading inside it and its centre inside the convex hull of the readings. Between its contacts every gap is under 180°, so that it can grow in no direction. If there is none, `no_inscribed_circle`.",
    ],
    formulas: ["maximise min |p_i − c|, c in the hull"],
    where: [],
    sources: [iso12181, "A. M. Andrew's monotone chain (Inf. Process. Lett. 9 (1979) 216)"],
  },
  {
    id: "minimum-circumscribed",
    title: "Minimum circumscribed (MCCI)",
    asked: "method: minimum_circumscribed",
    says: [
      "The smallest circle round all readings. The problem is convex and has one optimum, carried by two or three points: between its contacts no gap is over 180°. On an arc under 180° it leans on the ends of the arc, and the answer warns `criterion_unsuited_to_arc`.",
    ],
    formulas: ["minimise max |p_i − c|"],
    where: [],
    sources: [iso12181, "K. Fischer, B. Gärtner, The smallest enclosing ball of balls, SoCG 2003"],
  },
  {
    id: "ellipse",
    title: "Ellipse",
    asked: "method: ellipse",
    says: [
      "Orthogonal least squares, for a bore that is out of round at its horizontal joint. Ovality is major less minor diameter; its clock angle is that of the major axis, in [0, 180), and null where the ovality is no larger than its own expanded uncertainty. Under 240° of coverage it is refused as `coverage_insufficient`.",
    ],
    formulas: ["minimise Σ w_i · d_i²"],
    where: [["d_i", "orthogonal distance from the ellipse, its foot found exactly"]],
    sources: [
      "W. Gander, G. H. Golub, R. Strebel, BIT 34 (1994) 558",
      "D. Eberly, Distance from a Point to an Ellipse, an Ellipsoid, or a Hyperellipsoid, Geometric Tools",
    ],
  },
];

/** What holds for the three limiting circles alike. */
export const limitingSays: readonly string[] = [
  "Minimum zone, maximum inscribed and minimum circumscribed take no weights and a known taper only. Their `contacts` are all readings within 1e-9 of the radius of a limiting circle. Their covariance follows from the stated uncertainties of the contacts, held to stay the contacts; nothing stated, it is null, since extreme readings tell nothing of their scatter.",
];
