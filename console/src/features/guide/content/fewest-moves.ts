import { ownRule, type Method } from "../method.ts";

/** The choice of the parts to move, together with the axis. */
export const fewestMoves: readonly Method[] = [
  {
    id: "fewest-moves",
    title: "Axis and parts chosen together",
    asked: "POST /v1/fewest-moves: reference with float, components with cost",
    says: [
      "Moving a casing can take a week, and a slightly different axis can make it needless. The new axis may leave the one surveyed by the stated float at each reference station; where none is stated it stays. Axis and parts are chosen together so that the cost of the parts moved is least and every station conforms.",
      "A round tolerance stands in the program as tangents u; each choice that it gives is held against the circles themselves, and where it fails the tangents that show it are added, until the cheapest choice is proved. A part that stays is let off by no more than the largest amount M by which any allowed axis could pass its window. A part that carries another, or rests in one, states its travel: its limits are scaled by y.",
      "A program that takes too long, 20 s for the first, ends the search: the answer is then the best choice found, with its gap and `optimality_not_proved`.",
    ],
    formulas: [
      "minimise Σ c_k · y_k,   y_k = 0 or 1",
      "|d_i − a(z_i) + m_k(z_i)| + U_i ≤ T_i − margin",
      "u · (d_i − a(z_i)) ≤ T_i − U_i − margin + M · y_k",
    ],
    where: [
      ["c_k, y_k", "cost of a part, and whether it moves"],
      ["a, m_k", "float of the axis, and move of the part that carries the station"],
      ["d_i, U_i, T_i", "deviation, expanded uncertainty (0 by the simple rule) and tolerance of a station"],
    ],
    sources: [
      "JCGM 106:2012, clause 8.3",
      "R. T. Rockafellar, SIAM Journal on Control and Optimization 14 (1976) 877–898, from memory",
    ],
  },
  {
    id: "fewest-moves-held",
    title: "The moves that go with the choice",
    asked: null,
    says: [
      "With the parts held, axis and moves are those of the least sum of squared shares of the tolerances, every station inside; among these the least movement. Choices at one cost are compared by that sum. The limits that hold are solved as equations, so the answer carries no tolerance of a solver.",
      "Where no choice does, the answer is a set of demands and limits that contradict each other although every part that may move does: without any one of them the others can be met.",
      "`shimMoves` in the answer is the body of the next call: the same machine, deviations from the new axis, parts that stay fixed. Shims follow the moves only to their increment: send a margin to keep room for what they leave.",
    ],
    formulas: ["minimise Σ |d_i − a(z_i) + m_k(z_i)|² / T_i²"],
    where: [],
    sources: [
      "D. Goldfarb and A. Idnani, A numerically stable dual method for solving strictly convex quadratic programs, Mathematical Programming 27 (1983) 1–33, from memory",
      "J. Nocedal and S. Wright, Numerical Optimization, 2nd ed. 2006, chapter 18, from memory",
      ownRule,
    ],
  },
];
