/**
 * Ten parts, three appraisers A, B, C, three trials each: the worked example of AIAG, Measurement Systems Analysis,
 * 4th ed. 2010, III-B, a row a part. Data and the figures below as quoted by public test suites of general statistics
 * packages that check themselves against the handbook.
 */
export const publishedStudy: readonly (readonly (readonly number[])[])[] = [
  [0.29, 0.41, 0.64, 0.08, 0.25, 0.07, 0.04, -0.11, -0.15],
  [-0.56, -0.68, -0.58, -0.47, -1.22, -0.68, -1.38, -1.13, -0.96],
  [1.34, 1.17, 1.27, 1.19, 0.94, 1.34, 0.88, 1.09, 0.67],
  [0.47, 0.5, 0.64, 0.01, 1.03, 0.2, 0.14, 0.2, 0.11],
  [-0.8, -0.92, -0.84, -0.56, -1.2, -1.28, -1.46, -1.07, -1.45],
  [0.02, -0.11, -0.21, -0.2, 0.22, 0.06, -0.29, -0.67, -0.49],
  [0.59, 0.75, 0.66, 0.47, 0.55, 0.83, 0.02, 0.01, 0.21],
  [-0.31, -0.2, -0.17, -0.63, 0.08, -0.34, -0.46, -0.56, -0.49],
  [2.26, 1.99, 2.01, 1.8, 2.12, 2.19, 1.77, 1.45, 1.87],
  [-1.36, -1.25, -1.31, -1.68, -1.62, -1.5, -1.49, -1.77, -2.16],
].map((row) => [row.slice(0, 3), row.slice(3, 6), row.slice(6)]);

/** What the handbook and the packages print of it, and half of the last digit printed. */
export const publishedStudyPrinted = {
  sumOfSquares: {
    station: 88.3619,
    person: 3.1673,
    interaction: 0.359,
    repeatability: 2.7589,
    total: 94.6471,
  },
  dof: { station: 9, person: 2, interaction: 18, repeatability: 60, total: 89 },
  /** Against the interaction; the interaction against the repeats. */
  f: { station: 492.291, person: 79.406, interaction: 0.434 },
  interactionPValue: 0.974,
  /** Interaction pooled with the repeats (its probability is above 0.25): standard deviations. */
  pooled: {
    sumOfSquares: 3.1179,
    dof: 78,
    repeatability: 0.199933,
    reproducibility: 0.226838,
    reading: 0.302373,
    station: 1.042327,
  },
  /** Not pooled: repeatability alone, √0.04598. */
  repeatabilityNotPooled: 0.214435,
} as const;
