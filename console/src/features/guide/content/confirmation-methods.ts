import { commonPractice, ownRule, type Method } from "../method.ts";

/** How a later survey is held against an earlier one. */
export const confirmationMethods: readonly Method[] = [
  {
    id: "change",
    title: "A change against its uncertainty",
    asked: "before, after, level",
    says: [
      "Whether the change of a centre can be chance is asked of the vector, never of its length alone. Where the covariances were estimated, the limit is that of the confidence ellipse of a covariance of known shape; effective degrees of freedom by Welch–Satterthwaite along the direction that the statistic is taken in.",
      "At 0.95, one of twenty stations that did not move fails by chance.",
    ],
    formulas: [
      "D = after − before,   S = S_{before} + S_{after}",
      "D^T · S^{−1} · D ≤ chi-square(level; 2)",
      "estimated: ≤ 2 · F(level; 2, n)",
    ],
    where: [
      ["S", "covariances of the centres"],
      ["n", "effective degrees of freedom"],
    ],
    sources: ["Draper & Smith, Applied Regression Analysis", "Yao, Biometrika 52 (1965) 139, from memory"],
  },
  {
    id: "frame",
    title: "What changes are taken from",
    asked: "sameSetUp",
    says: [
      "Set-up untouched: centres are compared as read. Set up anew: deviations from each survey's own axis are compared, that is, changes off the shift and tilt that the reference stations share, found by generalised least squares with each change's whole covariance. Two reference stations always lie on that line, and then prove nothing: `repeats` is null.",
    ],
    formulas: ["minimise Σ (D_i − B_i · p)^T · S_i^{−1} · (D_i − B_i · p)"],
    where: [["p", "shift and tilt in h and in v"]],
    sources: ["Rao, Linear Statistical Inference, 4a, from memory"],
  },
  {
    id: "cause",
    title: "Why reference stations do not repeat",
    asked: "reference",
    says: [
      "A common shift and tilt is told apart from one station that moved by itself: three stations are needed with the set-up untouched, four with a new one. A suspect is one whose leaving out lets the rest pass. Where neither explanation, or more than one, does, the answer says so instead of guessing.",
    ],
    formulas: [],
    where: [],
    sources: ["W. Baarda, A testing procedure for use in geodetic networks, 1968, from memory"],
  },
  {
    id: "achieved",
    title: "Planned and achieved",
    asked: "moves, components",
    says: [
      "The rigid move that best fits what is stated at a component's supports is what each of its stations was to do. Stations that should not have moved and did are `unexpected`.",
    ],
    formulas: ["ratio = (achieved · planned) / |planned|²"],
    where: [["ratio", "1 when all was done; null when planned is 0"]],
    sources: [ownRule],
  },
  {
    id: "outstanding",
    title: "What is still to be measured",
    asked: "log",
    says: [
      "Every station not measured since its last move, reference stations first, since any move may have disturbed them; then those that moved, in the order sent.",
    ],
    formulas: [],
    where: [],
    sources: [commonPractice],
  },
];
