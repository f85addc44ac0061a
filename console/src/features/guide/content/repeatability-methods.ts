import type { Method } from "../method.ts";

/** How well readings repeat. */
export const repeatabilityMethods: readonly Method[] = [
  {
    id: "type-a",
    title: "Mean and Type A uncertainty",
    asked: "form: one_station",
    says: [
      "Repeat readings of one station by one person, as vectors. U of h and v by Student's factor; U of the radial distance by Hotelling's, since the whole covariance was estimated.",
    ],
    formulas: [
      "s² = Σ (y_i − y_m)² / (n − 1)",
      "u of the mean = s/√n",
      "k² = 2 · f/(f − 1) · F(level; 2, f − 1),   f = n − 1",
    ],
    where: [["y_m", "mean of the readings"]],
    sources: ["JCGM 100:2008, 4.2", "Hotelling's T² (Annals of Mathematical Statistics 2 (1931) 360)"],
  },
  {
    id: "drift",
    title: "Drift",
    asked: "readings: {at}",
    says: [
      "The least-squares slope against time, or against the order read, held against 0: in each plane by Student's t, both together by Hotelling's T². Neighbours that resemble each other beyond chance are a warning, since then s/√n is too small.",
    ],
    formulas: ["t = slope / standard error,   n − 2 degrees of freedom", "r_1 = Σ d_i · d_{i−1} / Σ d_i²"],
    where: [["d_i", "reading less mean"]],
    sources: ["Draper & Smith, Applied Regression Analysis, 1.4, from memory", "NIST/ITL StRD"],
  },
  {
    id: "grubbs",
    title: "The reading farthest off",
    asked: null,
    says: ["Grubbs' ratio with its two-sided limit. The reading is never dropped, only told."],
    formulas: ["|y − y_m|/s ≤ (n − 1)/√n · √(t² / (n − 2 + t²))"],
    where: [
      ["t", "exceeded with probability (1 − level)/n on both sides together, n − 2 degrees of freedom"],
    ],
    sources: ["NIST/SEMATECH e-Handbook 1.3.5.17.1"],
  },
  {
    id: "crossed",
    title: "People and stations, crossed",
    asked: "form: crossed",
    says: [
      "Every person reads every station the same number of times. Analysis of variance in h and in v, stations and people both taken as drawn at random: both are tested against the interaction, the interaction against the repeats. With `pooling: above` an interaction that chance makes as large more often than the probability stated is put with the repeats.",
    ],
    formulas: [
      "repeatability = MS_e",
      "interaction = (MS_i − MS_e)/r",
      "person = (MS_p − MS_i)/(a · r)",
      "station = (MS_s − MS_i)/(b · r)",
    ],
    where: [
      ["MS", "mean squares of repeats e, interaction i, people p, stations s"],
      ["a, b, r", "stations, people, repeats"],
    ],
    sources: [
      "Montgomery, Design and Analysis of Experiments, 13.3, from memory",
      "Satterthwaite, Biometrics Bulletin 2 (1946) 110",
    ],
  },
  {
    id: "share",
    title: "Per cent of tolerance",
    asked: "tolerance",
    says: [
      "Six standard deviations over the whole width of the tolerance; of a round one, in the worst direction. Over 30 % readings cannot judge it.",
    ],
    formulas: ["share = 100 · 6 · s / width"],
    where: [],
    sources: ["AIAG, Measurement Systems Analysis, 4th ed. 2010"],
  },
];
