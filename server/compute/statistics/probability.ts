/** Guards the two arguments that every distribution here takes: callers state them, so a breach is a defect, not a refusal. */
export function requireProbability(probability: number): void {
  if (!(probability > 0 && probability < 1)) {
    throw new RangeError(`A probability lies between 0 and 1; ${probability} does not.`);
  }
}

/** Degrees of freedom: finite and above zero. Infinity is written null and is handled by the caller. */
export function requireDof(dof: number): void {
  if (!(dof > 0 && Number.isFinite(dof))) {
    throw new RangeError(`Degrees of freedom are positive and finite; ${dof} is not.`);
  }
}
