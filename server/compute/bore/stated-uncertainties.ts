import { ComputeError } from "../compute-error.ts";

/**
 * The standard uncertainty of each reading: its own, else the bore's. Null where nothing is stated. Stated for some
 * readings only is not a weight of zero or one for the others: it is put on `refusals`.
 */
export function statedUncertainties(
  readings: readonly { readonly uMm: number | null }[],
  boreUncertaintyMm: number | null,
  member: string,
  refusals: ComputeError[],
): number[] | null {
  const n = readings.length;
  const uMm = new Array<number>(n);
  let stated = 0;
  for (let i = 0; i < n; i++) {
    const own = readings[i]!.uMm ?? boreUncertaintyMm;
    if (own === null) continue;
    uMm[i] = own;
    stated++;
  }
  if (stated === 0) return null;
  if (stated === n) return uMm;
  const index = readings.findIndex((reading) => reading.uMm === null);
  refusals.push(
    new ComputeError(
      "uncertainty_incomplete",
      `An uncertainty is stated for ${stated} of ${n} readings; reading ${index} has none, and the bore states none for all.`,
      { at: [member] },
    ),
  );
  return null;
}
