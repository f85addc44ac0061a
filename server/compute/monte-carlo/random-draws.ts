import { nextUniform, type StreamState } from "./wichmann-hill.ts";

/** Above it a scale found with so many degrees of freedom is known. */
const dofKnown = 1e9;

/**
 * Fills `into` with independent standard normal draws, by pairs: √(−2·ln r₁)·cos(2π·r₂) and the same with the sine, of
 * two uniform draws (Box and Muller, Annals of Mathematical Statistics 29 (1958) 610; JCGM 101:2008, C.4). The
 * second of a last half pair is let go.
 */
export function fillNormals(state: StreamState, into: Float64Array): void {
  for (let i = 0; i < into.length; i += 2) {
    const length = Math.sqrt(-2 * Math.log(positiveUniform(state)));
    const angleRad = 2 * Math.PI * nextUniform(state);
    into[i] = length * Math.cos(angleRad);
    if (i + 1 < into.length) into[i + 1] = length * Math.sin(angleRad);
  }
}

/**
 * √(ν/w), w a draw of chi-square with ν > 0 degrees of freedom: times a normal draw it is one of Student's t, and
 * times a normal vector one of the multivariate t, as an uncertainty found with ν degrees of freedom asks (JCGM
 * 101:2008, 6.4.9; JCGM 102:2011, 5.3.2). 1 where ν is null (infinite). w/2 by the gamma draw of Marsaglia and Tsang
 * (ACM TOMS 26 (2000) 363), which takes any ν; about one try a draw. Infinity where ν is so small that w underflows.
 */
export function nextStudentScale(state: StreamState, dof: number | null): number {
  if (dof === null || dof > dofKnown) return 1;
  return Math.sqrt(dof / 2 / nextGamma(state, dof / 2));
}

/** Gamma with shape a > 0 and scale 1; below 1 from that of a + 1. */
function nextGamma(state: StreamState, shape: number): number {
  if (shape < 1) return nextGamma(state, shape + 1) * positiveUniform(state) ** (1 / shape);
  const d = shape - 1 / 3;
  const c = 1 / Math.sqrt(9 * d);
  for (;;) {
    const x = Math.sqrt(-2 * Math.log(positiveUniform(state))) * Math.cos(2 * Math.PI * nextUniform(state));
    const v = (1 + c * x) ** 3;
    if (v > 0 && Math.log(positiveUniform(state)) < (x * x) / 2 + d - d * v + d * Math.log(v)) return d * v;
  }
}

/** Of 2^121 states some give 0, whose logarithm is none: the next one is taken. */
function positiveUniform(state: StreamState): number {
  let value = nextUniform(state);
  while (value === 0) value = nextUniform(state);
  return value;
}
