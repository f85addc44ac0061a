/** One printed figure and half of its last printed digit (or the accuracy it was printed to). */
export interface PrintedFigure {
  readonly value: number;
  readonly within: number;
}

/** A straight line y = at0 + slope·x fitted in print: small enough to stand here, so that the engine can check itself anywhere. */
export interface PublishedLine {
  readonly id: string;
  readonly source: string;
  readonly x: readonly number[];
  readonly y: readonly number[];
  /** Standard uncertainties of y; null where the source takes them from the residuals. */
  readonly u: readonly number[] | null;
  readonly at0: PrintedFigure;
  readonly slope: PrintedFigure;
  readonly uAt0: PrintedFigure;
  readonly uSlope: PrintedFigure;
  /** Correlation or covariance of at0 and slope, as printed. */
  readonly covariance?: PrintedFigure;
  readonly correlation?: PrintedFigure;
  readonly chiSquare?: PrintedFigure;
  readonly scatter?: PrintedFigure;
  /** Height of the line away from its points, with its standard uncertainty. */
  readonly predicted?: { readonly x: number; readonly y: PrintedFigure; readonly u: PrintedFigure };
}

export const publishedLines: readonly PublishedLine[] = [
  {
    id: "iso-ts-28037-example-1",
    source:
      "ISO/TS 28037:2010, clause 6, example 1 (p. 13), as quoted in the GUM Tree Calculator's test suite (MSLNZ/GTC, test_fitting.py)",
    x: [1, 2, 3, 4, 5, 6],
    y: [3.3, 5.6, 7.1, 9.3, 10.7, 12.1],
    u: [0.5, 0.5, 0.5, 0.5, 0.5, 0.5],
    at0: { value: 1.866667, within: 1e-6 },
    slope: { value: 1.757143, within: 1e-6 },
    uAt0: { value: 0.4654747, within: 1e-6 },
    uSlope: { value: 0.1195229, within: 1e-6 },
    covariance: { value: -0.05, within: 1e-6 },
    chiSquare: { value: 1.665, within: 1e-3 },
  },
  {
    id: "gum-tree-calculator-weights",
    source:
      "GUM Tree Calculator's test suite, values computed with R lm(weights) (MSLNZ/GTC, test_fitting.py)",
    x: [1, 2, 3, 4, 5, 6],
    y: [3.014, 5.225, 7.004, 9.061, 11.201, 12.762],
    u: [0.2, 0.2, 0.2, 0.4, 0.4, 0.4],
    at0: { value: 1.13754, within: 6e-6 },
    slope: { value: 1.97264, within: 6e-6 },
    uAt0: { value: 0.21188326, within: 6e-9 },
    uSlope: { value: 0.07115681, within: 6e-9 },
    covariance: { value: -0.01316456, within: 6e-9 },
  },
  {
    id: "gum-h3-thermometer",
    source:
      "JCGM 100:2008 (GUM), annex H.3, Table H.6 and H.3.3 to H.3.4, x = t − 20 °C, as quoted in MSLNZ/GTC, GUM_H3.py",
    x: [1.521, 2.012, 2.512, 3.003, 3.507, 3.999, 4.513, 5.002, 5.503, 6.01, 6.511],
    y: [-0.171, -0.169, -0.166, -0.159, -0.164, -0.165, -0.156, -0.157, -0.159, -0.161, -0.16],
    u: null,
    at0: { value: -0.1712, within: 6e-5 },
    slope: { value: 0.00218, within: 6e-6 },
    uAt0: { value: 0.0029, within: 6e-5 },
    uSlope: { value: 0.00067, within: 6e-6 },
    correlation: { value: -0.93, within: 6e-4 },
    scatter: { value: 0.0035, within: 6e-5 },
    predicted: { x: 10, y: { value: -0.1494, within: 6e-5 }, u: { value: 0.0041, within: 6e-5 } },
  },
];
