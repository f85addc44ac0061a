import { ownRule, type Method } from "../method.ts";

/** How the reference axis is set. */
export const axisMethods: readonly Method[] = [
  {
    id: "two-station",
    title: "Through two stations",
    asked: "axis: {method: two_station}",
    says: [
      "The line through centre − target of exactly two reference stations, in h and in v. Both then deviate by exactly 0.",
    ],
    formulas: ["h(z) = a + b · z,   v(z) = c + d · z"],
    where: [],
    sources: [ownRule],
  },
  {
    id: "least-squares-axis",
    title: "Least squares",
    asked: "axis: {method: least_squares}",
    says: [
      "Two or more stations, weighed in each plane by 1/variance of centre and target together when every one states a covariance; else alike, and then the scatter s of each plane is taken from the residuals with n − 2 degrees of freedom.",
      "With stated covariances chi-square is answered, and passing its 0.95 quantile is a warning, not a silent inflation.",
    ],
    formulas: ["minimise Σ (y_i − a − b · z_i)² / u_i²"],
    where: [["y_i", "centre − target of a reference station, in one plane"]],
    sources: [ownRule],
  },
  {
    id: "minimum-zone-axis",
    title: "Minimum zone",
    asked: "axis: {method: minimum_zone, zone}",
    says: [
      "Three or more stations: the largest distance is least, in each plane by itself or, with `zone: cylinder`, by radial distance: the cylinder of least diameter, the straightness zone of ISO 1101. Weights multiply distances; covariances weigh nothing.",
      "Proved before it is answered: multipliers q with Σ q = 0 and Σ q·z = 0 give every line the same lower bound, and the largest distance meets it within 1e-9. Contacts, multipliers and bound are in the answer.",
    ],
    formulas: ["minimise max w_i · |d_i|", "max w_i · |d_i| ≥ Σ q_i · y_i,   Σ |q_i|/w_i = 1"],
    where: [
      ["d_i", "distance of a reference station from the axis"],
      ["q_i", "a number at each contact; with a cylinder a vector"],
    ],
    sources: ["ISO 1101", "Boyd and Vandenberghe, Convex Optimization (2004), section 11.3"],
  },
  {
    id: "least-absolute",
    title: "Least absolute",
    asked: "axis: {method: least_absolute, zone}",
    says: [
      "Three or more stations: the sum of distances is least, which leaves the most stations untouched. In each plane the line passes through two stations and is turned about them until no turn lowers the sum; with `zone: cylinder` by Newton's method on radial distances. Proved by the same kind of bound.",
    ],
    formulas: ["minimise Σ w_i · |d_i|", "Σ w_i · |d_i| ≥ Σ q_i · y_i,   |q_i| ≤ w_i"],
    where: [],
    sources: ["L. A. Karst, Linear curve fitting using least deviations, JASA 53 (1958) 118, from memory"],
  },
  {
    id: "line-of-sight",
    title: "Line of sight",
    asked: "axis: {method: line_of_sight}",
    says: ["The beam itself: the axis is 0 in both planes, exactly, and no station is a reference."],
    formulas: ["h(z) = 0,   v(z) = 0"],
    where: [],
    sources: [ownRule],
  },
];
