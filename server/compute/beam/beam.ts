/** What holds at one place of a bent beam: at the left end of an element, or where it was asked for. */
export interface BeamState {
  /** Height of the bent line, positive up. */
  readonly upMm: number;
  /** Rise per length along z. */
  readonly slope: number;
  /** Positive where the beam sags (its lower side is stretched), N·mm. */
  readonly momentNmm: number;
  /** dM/dz, N; just right of the place. */
  readonly shearN: number;
}

/** A stretch without jumps: one stiffness, one load along it, no force or support inside. The state is that at `fromMm`. */
export interface BeamElement extends BeamState {
  readonly fromMm: number;
  readonly toMm: number;
  readonly stiffnessNmm2: number;
  readonly loadNPerMm: number;
}

export interface SupportAnswer {
  readonly zMm: number;
  readonly upMm: number;
  /** What the support presses up with; negative where it would have to pull down. */
  readonly reactionN: number;
  readonly momentNmm: number;
  readonly slope: number;
}

/** A solved beam. */
export interface Beam {
  /** From left to right, without gaps. */
  readonly elements: readonly BeamElement[];
  /** In the order of the input. */
  readonly supports: readonly SupportAnswer[];
  /**
   * How far the bent line, followed element by element from each support, misses the height and the slope at the next
   * one, relative to the lengths it is made of: a check of the whole solution, of the order of 1e-15.
   */
  readonly closure: number;
}

/**
 * State `alongMm` right of the left end of an element: the quartic that solves E·I·v″ = M exactly for a load that is even
 * along the element (any handbook of beams). Heights in mm, moments in N·mm, shear in N.
 */
export function stateWithin(element: BeamElement, alongMm: number): BeamState {
  const { upMm, slope, momentNmm, shearN, stiffnessNmm2, loadNPerMm } = element;
  const t = alongMm;
  const turn = t * (momentNmm + t * (shearN / 2 - (t * loadNPerMm) / 6));
  const bend = t * t * (momentNmm / 2 + t * (shearN / 6 - (t * loadNPerMm) / 24));
  return {
    upMm: upMm + slope * t + bend / stiffnessNmm2,
    slope: slope + turn / stiffnessNmm2,
    momentNmm: momentNmm + t * (shearN - (t * loadNPerMm) / 2),
    shearN: shearN - t * loadNPerMm,
  };
}

/** State of a beam at `zMm`; beyond its ends the end elements are carried on. Logarithmic in the number of elements. */
export function stateAt(beam: Beam, zMm: number): BeamState {
  const { elements } = beam;
  let low = 0;
  let high = elements.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (elements[middle]!.fromMm <= zMm) low = middle;
    else high = middle - 1;
  }
  const element = elements[low]!;
  return stateWithin(element, zMm - element.fromMm);
}
