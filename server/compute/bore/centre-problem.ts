import type { LocalFrame } from "./local-frame.ts";

/**
 * Points round which a centre c is sought by the largest and the smallest of gᵢ(c) = |pᵢ − c| − added. Lengths are in
 * units of `unit` × the local frame's scale, chosen so that every |pᵢ| is at most 1.
 */
export interface CentreProblem {
  readonly count: number;
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** What a known taper adds to each distance, z·tan α; null where there is none. */
  readonly added: Float64Array | null;
  /** A power of two, in units of the frame. */
  readonly unit: number;
}

/** The readings of a frame as a problem of the centre, with the tangent of a known taper's half angle. */
export function centreProblemOf({ count, x, y, z }: LocalFrame, tangent: number): CentreProblem {
  let reach = 0;
  for (let i = 0; i < count; i++) reach = Math.max(reach, Math.hypot(x[i]!, y[i]!));
  const unit = 2 ** Math.ceil(Math.log2(reach));
  return {
    count,
    x: x.map((value) => value / unit),
    y: y.map((value) => value / unit),
    added: z === null || tangent === 0 ? null : z.map((value) => (value * tangent) / unit),
    unit,
  };
}

/** A place of the plane, in the units of the problem. */
export interface Place {
  readonly x: number;
  readonly y: number;
}
