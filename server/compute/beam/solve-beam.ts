import { assertFinite, ComputeError } from "../compute-error.ts";
import { stateWithin, type Beam, type BeamElement, type SupportAnswer } from "./beam.ts";
import type { BeamInput } from "./beam-input.ts";
import { bendSpan, overhangAt, type SpanElement } from "./bend-span.ts";
import { cutBeam, type BeamStretch, type CutBeam } from "./cut-beam.ts";
import { solveTridiagonal } from "./solve-tridiagonal.ts";

/** A bent line that misses its own supports by more is not the solution. */
const closureMax = 1e-9;
/** Bends of less than this are none: numbers so small have few digits left. */
const sizeMinMm = 1e-200;

/**
 * Bends a stepped Euler–Bernoulli beam, with overhangs, on any number of supports at given heights: exact for even loads
 * along its pieces and forces at points, however few pieces there are.
 *
 * Every span between supports is one element with its exact flexibility; the unknowns are the moments over the supports,
 * from the slopes that two neighbouring spans share (theorem of three moments, Clapeyron 1857, for stepped spans). Their
 * matrix is tridiagonal, positive definite and diagonally dominant at any scale, so that thousands of steps lose no
 * digits, as the stiffness matrix of as many elements would. Shear is left out: it adds some 2 % to the sag of a solid
 * steel shaft whose span is ten diameters (S. P. Timoshenko, Strength of Materials I; from memory).
 *
 * Linear in pieces, forces and supports but for sorting them.
 * @throws ComputeError shaft_unsupported, out_of_range as `cutBeam`; rank_deficient or not_converged when stiffnesses are
 *   so far apart that the bent line does not meet its supports; result_overflow
 */
export function solveBeam(input: BeamInput): Beam {
  const cut = cutBeam(input);
  const { supports, stretches, forces } = cut;
  const first = supports[0]!;
  const last = supports.at(-1)!;
  const parts = partsBetween(cut);
  const spans = parts.spans.map((part, i) =>
    bendSpan(part, forces, [supports[i]!.zMm, supports[i + 1]!.zMm]),
  );
  const left = overhangAt(parts.left, forces, first.zMm);
  const right = overhangAt(parts.right, forces, last.zMm);
  const moments = supportMoments(cut, spans, left.momentNmm, right.momentNmm);
  const slopes = supportSlopes(cut, spans, moments);

  const elements: BeamElement[] = followLeft(parts.left, forces, first.upMm, slopes[0]!);
  const followed = spans.map((span, i) => {
    const lengthMm = span.toMm - span.fromMm;
    const shearN = span.leftReactionN + (moments[i + 1]! - moments[i]!) / lengthMm;
    const start = { upMm: supports[i]!.upMm, slope: slopes[i]!, momentNmm: moments[i]!, shearN };
    return follow(parts.spans[i]!, forces, start);
  });
  for (const one of followed) elements.push(...one.elements);
  const afterLast = {
    upMm: last.upMm,
    slope: slopes.at(-1)!,
    momentNmm: right.momentNmm,
    shearN: right.downN,
  };
  elements.push(...follow(parts.right, forces, afterLast).elements);

  const answers: SupportAnswer[] = [];
  for (const [i, { index, zMm, upMm }] of supports.entries()) {
    const shearLeftN = i === 0 ? -left.downN : followed[i - 1]!.end.shearN;
    const shearRightN = i === spans.length ? right.downN : followed[i]!.elements[0]!.shearN;
    const reactionN = shearRightN - shearLeftN + (forces.get(zMm) ?? 0);
    assertFinite(reactionN, "A reaction");
    answers[index] = { zMm, upMm, reactionN, momentNmm: moments[i]!, slope: slopes[i]! };
  }
  const misses = followed.map(({ end, sizeMm }, i) => {
    const lengthMm = spans[i]!.toMm - spans[i]!.fromMm;
    const missMm =
      Math.abs(end.upMm - supports[i + 1]!.upMm) + Math.abs(end.slope - slopes[i + 1]!) * lengthMm;
    return missMm / Math.max(sizeMm, sizeMinMm);
  });
  const closure = assertFinite(Math.max(...misses), "The bent line");
  if (closure > closureMax) {
    const detail = "The stiffnesses of the beam are too far apart: the bent line does not meet its supports.";
    throw new ComputeError("not_converged", detail, { reached: closure, limit: closureMax });
  }
  for (const { upMm } of [elements[0]!, ...(stretches.length > 0 ? [elements.at(-1)!] : [])]) {
    assertFinite(upMm, "The height of an end");
  }
  return { elements, supports: answers, closure };
}

interface Parts {
  readonly left: BeamStretch[];
  readonly spans: BeamStretch[][];
  readonly right: BeamStretch[];
}

function partsBetween({ stretches, supports }: CutBeam): Parts {
  const parts: Parts = { left: [], spans: supports.slice(1).map(() => []), right: [] };
  let passed = 0;
  for (const stretch of stretches) {
    while (passed < supports.length && stretch.fromMm >= supports[passed]!.zMm) passed++;
    if (passed === 0) parts.left.push(stretch);
    else (parts.spans[passed - 1] ?? parts.right).push(stretch);
  }
  return parts;
}

/** Slope of the straight line between two neighbouring supports. */
function chordSlope({ supports }: CutBeam, span: number): number {
  const [a, b] = [supports[span]!, supports[span + 1]!];
  return (b.upMm - a.upMm) / (b.zMm - a.zMm);
}

/** Moment over every support: those at the ends are the overhangs' own, those between make slopes meet. */
function supportMoments(
  cut: CutBeam,
  spans: readonly SpanElement[],
  firstNmm: number,
  lastNmm: number,
): number[] {
  const between = spans.slice(1).map((right, i) => ({ left: spans[i]!, right, at: i + 1 }));
  const diagonal = between.map(({ left, right }) => left.farFar + right.nearNear);
  const beside = between.slice(1).map(({ left }) => left.nearFar);
  const rightSide = between.map(({ left, right, at }) => {
    const kink = chordSlope(cut, at) - chordSlope(cut, at - 1) - left.loadFar - right.loadNear;
    const known =
      (at === 1 ? left.nearFar * firstNmm : 0) + (at === spans.length - 1 ? right.nearFar * lastNmm : 0);
    return kink - known;
  });
  return [firstNmm, ...solveTridiagonal(diagonal, beside, rightSide), lastNmm];
}

function supportSlopes(cut: CutBeam, spans: readonly SpanElement[], moments: readonly number[]): number[] {
  const slopes = spans.map(
    ({ loadNear, nearNear, nearFar }, i) =>
      chordSlope(cut, i) - (loadNear + nearNear * moments[i]! + nearFar * moments[i + 1]!),
  );
  const end = spans.length - 1;
  const { loadFar, nearFar, farFar } = spans[end]!;
  slopes.push(chordSlope(cut, end) + loadFar + nearFar * moments[end]! + farFar * moments[end + 1]!);
  return slopes;
}

type State = Pick<BeamElement, "upMm" | "slope" | "momentNmm" | "shearN">;

/** Follows stretches from a known left state; forces at a stretch's left end act but for that of the first, a support. */
function follow(
  stretches: readonly BeamStretch[],
  forces: CutBeam["forces"],
  start: State,
): { readonly elements: BeamElement[]; readonly end: State; readonly sizeMm: number } {
  const elements: BeamElement[] = [];
  let state = start;
  let sizeMm = Math.abs(start.upMm);
  for (const [i, stretch] of stretches.entries()) {
    const shearN = state.shearN - (i === 0 ? 0 : (forces.get(stretch.fromMm) ?? 0));
    const element = { ...stretch, ...state, shearN };
    elements.push(element);
    const h = stretch.toMm - stretch.fromMm;
    state = stateWithin(element, h);
    const pull = Math.abs(element.momentNmm) + Math.abs(shearN) * h + Math.abs(stretch.loadNPerMm) * h * h;
    sizeMm += Math.abs(element.slope) * h + (pull * h * h) / stretch.stiffnessNmm2;
  }
  return { elements, end: state, sizeMm };
}

/** An overhanging left end: loads are added up from its free end, the bent line is followed back from the support. */
function followLeft(
  stretches: readonly BeamStretch[],
  forces: CutBeam["forces"],
  supportUpMm: number,
  supportSlope: number,
): BeamElement[] {
  let loaded: Pick<State, "momentNmm" | "shearN"> = { momentNmm: 0, shearN: 0 };
  const flat = stretches.map((stretch) => {
    const shearN = loaded.shearN - (forces.get(stretch.fromMm) ?? 0);
    const element: BeamElement = { ...stretch, momentNmm: loaded.momentNmm, shearN, upMm: 0, slope: 0 };
    loaded = stateWithin(element, stretch.toMm - stretch.fromMm);
    return element;
  });
  let right = { upMm: supportUpMm, slope: supportSlope };
  return flat
    .reverse()
    .map((element) => {
      const h = element.toMm - element.fromMm;
      const own = stateWithin(element, h);
      const slope = right.slope - own.slope;
      const upMm = right.upMm - slope * h - own.upMm;
      right = { upMm, slope };
      return { ...element, upMm, slope };
    })
    .reverse();
}
