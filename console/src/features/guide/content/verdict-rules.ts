import { ownRule, type Method } from "../method.ts";

/** What a deviation is, how well it is known, and how it is judged. */
export const verdictRules: readonly Method[] = [
  {
    id: "deviation",
    title: "Deviation and its covariance",
    asked: null,
    says: [
      "A reference station sits at its target, not on the axis itself, so the axis is fitted to centre − target. Its deviation is correlated with the axis that it helped to set: the whole covariance is carried, with the h–v terms and the targets' uncertainties. Only with weights 1/u² does it reduce to u² plus or minus the axis' own variance.",
      "Effective degrees of freedom by Welch–Satterthwaite, along h, along v and along the worst direction; the least of the three serves both factors.",
    ],
    formulas: ["d_i = centre_i − target_i − axis(z_i)", "covariance of d = A · S · A^T"],
    where: [
      ["A", "gains of the deviation on all observations"],
      ["S", "covariances of centres and targets"],
    ],
    sources: [ownRule],
  },
  {
    id: "guarded",
    title: "Guarded verdict",
    asked: "verdict: {rule: guarded}",
    says: [
      "Acceptance and rejection are both held back by the expanded uncertainty U; what lies between is `undecided`, which is not conforming. h and v tolerances take U = k · u in each plane: both must conform, either can exceed. Without a covariance the verdict is `undecided` with a warning.",
      "It is the default. `simple` judges the deviation alone.",
    ],
    formulas: ["conforms: |d| + U ≤ T", "exceeds: |d| − U > T", "U = k · u, in each plane"],
    where: [
      ["T", "half-width of the tolerance"],
      ["k", "two-sided Student factor"],
    ],
    sources: ["JCGM 106:2012, clause 8.3", "the idea of ISO 14253-1"],
  },
  {
    id: "radial-factor",
    title: "Radial tolerances: the factor k2",
    asked: "tolerance: {radial}",
    says: [
      "A radial deviation is the length of a vector in the plane, so it takes the two-dimensional factor on the worst direction. The one-dimensional factor would promise 95 % and keep 85 % of round scatter.",
      "A read radius is biased upward near zero: radii are never averaged or tested for change, vectors are.",
    ],
    formulas: [
      "U = k_2 · √(larger eigenvalue of the covariance)",
      "k_2 = √(2 · F(level; 2, n))",
      "F(level; 2, n) = (n/2) · ((1 − level)^{−2/n} − 1)",
      "n infinite: k_2 = √(−2 · ln(1 − level)), 2.4477 at 0.95",
    ],
    where: [["n", "effective degrees of freedom"]],
    sources: [ownRule],
  },
  {
    id: "tolerance-forms",
    title: "Tolerances",
    asked: "tolerance: {radial} | {h, v} | {h: [min, max], v: [min, max]}",
    says: [
      "Half-widths, or [min, max] where they are one-sided, as bearings often are. Then T is the half-width of the range, and d is measured from its middle: for the ratio, the verdict and what the moves aim at.",
      "`ratio` is the share of the tolerance used, in h and v the larger.",
    ],
    formulas: ["T = (max − min)/2,   d from (max + min)/2", "ratio = |d|/T"],
    where: [],
    sources: [ownRule],
  },
];
