import { ownRule, type Method } from "../method.ts";

/** What is fitted beside the circle, and how well all of it is known. */
export const fitQuality: readonly Method[] = [
  {
    id: "taper",
    title: "Taper and tilt",
    asked: "taper: {halfAngleDeg} or {estimate: true}",
    says: [
      "A conical bore has its radius grow with z from the station's plane, positive where it opens downstream. The half angle is known, or one more unknown. Without a taper, points at two or more planes give a tilted cylinder. Residuals are radial, not normal to the cone; centre and size are those at z = 0.",
    ],
    formulas: ["r_i = |p_i − c − z_i · s| − z_i · tan(a) − R"],
    where: [
      ["a", "half angle"],
      ["s", "slopes of the centre line in h and v"],
      ["z_i", "from the station's plane, downstream"],
    ],
    sources: [ownRule],
  },
  {
    id: "mad",
    title: "Readings that stand out",
    asked: "outliers: {rule: mad, threshold}",
    says: [
      "Nothing is ever dropped silently, and nothing at all unless `mad` is asked for. While the largest |r|/u passes the limit, that one reading is put aside (the first of equals) and the fit is made again. It stops at a median of 0, at two readings more than unknowns, or when half are out. Before a limiting circle, readings are judged by the least-squares circle.",
      "The answer names every reading put aside with its ratio at that moment, and warns where fewer than eight readings were there to judge by.",
    ],
    formulas: ["limit = threshold × 1.4826 × median(|r_i|/u_i)"],
    where: [
      ["r_i", "residuals of the readings in use, about zero"],
      ["threshold", "3.5 when absent"],
      ["1.4826", "makes the median of |r| the standard deviation of a normal distribution"],
    ],
    sources: [ownRule],
  },
  {
    id: "covariance",
    title: "Covariance of the fit",
    asked: "readingUncertainty, or u of each reading",
    says: [
      "Scatter beyond what was stated enlarges the covariance; less does not shrink it. The degrees of freedom join without a jump. Where nothing is stated, the scatter of the residuals stands for it. Stated for some readings only is refused as `uncertainty_incomplete`.",
      "Nothing left over to check by: the stated uncertainties stand as they are; without any the covariance is null. Both warn `no_redundancy`.",
    ],
    formulas: [
      "C = F · (J^T · W · J)^{−1}",
      "q = Σ (r_i/u_i)² / (n − p)",
      "stated: F = max(1, q)",
      "dof = (n − p) · (q/(q − 1))², infinite while q ≤ 1",
      "nothing stated: W = 1, F = Σ r_i² / (n − p), dof = n − p",
    ],
    where: [
      ["J", "slopes of the residuals in the unknowns"],
      ["W", "1/u² of each reading"],
      ["n, p", "readings in use, and unknowns"],
    ],
    sources: [ownRule],
  },
  {
    id: "expanded",
    title: "Expanded uncertainty",
    asked: "level",
    says: [
      "Half-widths of centre and diameter at the level, 0.95 when absent. The answer carries the factor and the degrees of freedom; null is infinite.",
    ],
    formulas: ["U = k · u,   P(|t| < k) = level"],
    where: [
      ["k", "two-sided Student factor of the degrees of freedom"],
      ["u", "standard uncertainty from the covariance"],
    ],
    sources: ["Abramowitz & Stegun 26.7.1"],
  },
  {
    id: "coverage",
    title: "Coverage of the bore",
    asked: null,
    says: [
      "Partial arcs are normal: blades or lower halves are in the way. Coverage is 360° less the largest gap between neighbouring readings, as seen from the centre answered. When the centre's worst standard uncertainty is over three times that of as many readings evenly round, the answer warns `weak_arc`.",
    ],
    formulas: ["coverageDeg = 360 − largestGapDeg", "u of an even ring = u · √(2/n)"],
    where: [["n", "readings in use"]],
    sources: [ownRule],
  },
];
