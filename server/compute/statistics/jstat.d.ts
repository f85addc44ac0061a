/** The few functions of the test-only side check, which ships no types. */
declare module "jstat" {
  interface Distribution {
    inv(probability: number, ...parameters: number[]): number;
    cdf(value: number, ...parameters: number[]): number;
  }
  const jstat: {
    readonly studentt: Distribution;
    readonly chisquare: Distribution;
    readonly centralF: Distribution;
  };
  export = jstat;
}
