import { commonPractice, ownRule, type Method } from "../method.ts";

/** What readings will tell before they are taken. */
export const planMethods: readonly Method[] = [
  {
    id: "wanted",
    title: "What is wanted",
    asked: "wanted: {expandedUncertainty} or {tolerance, ratio}",
    says: [
      "An expanded uncertainty of the centre, or a tolerance and how many times smaller the uncertainty should be. Half-width over expanded uncertainty of 4 is the default.",
    ],
    formulas: ["U wanted = T / ratio,   4 when absent"],
    where: [["T", "half-width of the tolerance"]],
    sources: [commonPractice],
  },
  {
    id: "predicted-covariance",
    title: "Predicted covariance",
    asked: "readingUncertainty, read, reachable",
    says: [
      "The covariance that readings at these clock angles give the centre, the radius fitted beside it (of spots on a turned target the mounting error). What they will scatter beyond their stated uncertainty is not known, so the bore's own shape belongs in it.",
      "`dilution` is the worst standard uncertainty over that of as many readings evenly round; 1 is best.",
    ],
    formulas: ["C = (Σ w · (n − n_m) · (n − n_m)^T)^{−1}", "evenly round: u · √(2/N), spots u/√N"],
    where: [
      ["n, n_m", "direction of a reading from the centre, and their weighted mean"],
      ["w", "1/u²"],
      ["N", "readings"],
    ],
    sources: [ownRule],
  },
  {
    id: "adding",
    title: "Where to read more",
    asked: "reachable: {clockDegs} or {ranges, stepDeg}",
    says: [
      "Readings are added one by one where each lowers the largest variance most, then moved and dropped while that betters the choice. That is a heuristic, and is told as one.",
      "The fewest readings that any choice needs are bounded from below by weak duality: no choice does with fewer. Where the count found equals the bound it is the least, and the answer says `proved`.",
    ],
    formulas: ["minimise the larger eigenvalue of C, or the larger of its h and v shares"],
    where: [],
    sources: ["V. V. Fedorov, Theory of Optimal Experiments (1972)", "M. Frank, P. Wolfe (1956)"],
  },
];
