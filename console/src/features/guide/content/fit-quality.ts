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
    id: "at-20-degrees",
    title: "Diameter at 20 °C",
    asked: "gaugeTemperature, partTemperature, each with a coefficient or a material",
    says: [
      "`diameter` is as read. Where a bore states how warm its gauge, its part or both were, `diameterAt20C` stands beside it: a warm gauge has long divisions and reads short, a warm part is large. A 1200 mm steel bore at 45 °C is 0.36 mm large. The gauge is whatever carries the scale: the instrument, or the master that it was set to.",
      "With one side stated the other is taken as it was read, and the answer warns `one_temperature_stated`. Centres are not touched. What is not known of temperatures and coefficients is left out of every uncertainty: 1 °C on that bore is 0.014 mm.",
    ],
    formulas: ["D_20 = D · (1 + α_g · (t_g − 20 °C)) / (1 + α_p · (t_p − 20 °C))"],
    where: [
      ["D", "diameter as read"],
      ["α_g, t_g", "mean expansion and temperature of the gauge"],
      ["α_p, t_p", "those of the part"],
    ],
    sources: ["ISO 1:2016"],
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
    id: "monte-carlo",
    title: "First order held against Monte Carlo",
    asked: "monteCarlo: {trials, seed, significantDigits}, of bore fits, axis deviations and alignments",
    says: [
      "Every expanded uncertainty here is of first order: as if the fit were linear over the reach of its errors. On short arcs, with limiting circles, and where a few readings set the scatter, it is not. Then each trial draws every reading anew, fits the bore or sets the axis anew, and the spread of the results stands beside the first order.",
      "Readings are normal with the uncertainties stated, points in h and v alike. Where nothing is stated, or the scatter passes it, the scale itself is drawn with its degrees of freedom (Student's t). Centres of stations are drawn with their whole covariance, targets in h and v. Clock angles, z and readings put aside stay as they are.",
      "`confirmed` is true when both ends of both intervals agree within the tolerance d, false with `first_order_not_confirmed` when they do not. It is null with `trials_too_few` where so many trials cannot tell, and with `uncertainty_unknown` where there is nothing to draw. A trial that cannot be computed is counted, `trials_failed`, and might have fallen anywhere.",
      "The same seed gives the same numbers. The stream of each bore and station comes from seed and id, so that their order changes nothing. A cold target is a plain sum of normal growths: there first order is exact, and no trials are needed.",
    ],
    formulas: [
      "confirmed: |y − U − y_low| ≤ d and |y + U − y_high| ≤ d",
      "y_low, y_high: ranks r and r + q of M sorted results,   q = level · M,   r = (M − q)/2",
      "d = 10^L/2 where u = c · 10^L",
      "i_j ← a_j · i_j mod m_j,   j = 1 … 4;   uniform = Σ i_j/m_j less its whole part",
      "normal = √(−2 · ln r_1) · cos(2π · r_2) and √(−2 · ln r_1) · sin(2π · r_2)",
    ],
    where: [
      ["y, u, U", "value, standard and expanded uncertainty of first order"],
      ["c", "a whole number of one digit, of two where u begins with 1, or as asked"],
      ["a_j, m_j", "11600, 47003, 23000, 33000; 2147483579, 2147483543, 2147483423, 2147483123"],
      ["r_1, r_2", "uniform draws"],
    ],
    sources: [
      "JCGM 101:2008, 8.1",
      "JCGM 101:2008, 7.7",
      "JCGM 101:2008, 7.9.2",
      "JCGM 101:2008, 6.4.9",
      "JCGM 102:2011, 5.3.2",
      "JCGM 101:2008, C.3",
      "JCGM 101:2008, C.4",
    ],
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
