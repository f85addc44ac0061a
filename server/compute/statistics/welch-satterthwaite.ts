/**
 * Effective degrees of freedom of a sum of independent variances: (Σ v)²/Σ(v²/ν), the Welch–Satterthwaite formula
 * (JCGM 100:2008, G.2b), each v a squared sensitivity times a variance, ν the degrees of freedom it was found with
 * (Infinity: known exactly). Null when the sum is known exactly. Units cancel.
 */
export function welchSatterthwaite(
  variances: ArrayLike<number>,
  degreesOfFreedom: ArrayLike<number>,
): number | null {
  let total = 0;
  for (let i = 0; i < variances.length; i += 1) total += variances[i]!;
  if (total === 0) return null;
  let inverse = 0;
  for (let i = 0; i < variances.length; i += 1) {
    const share = variances[i]! / total;
    inverse += (share * share) / degreesOfFreedom[i]!;
  }
  return inverse === 0 ? null : 1 / inverse;
}
