import { ComputeError } from "../compute-error.ts";
import type { PlaneVector } from "../plane.ts";
import { centreProblemOf } from "./centre-problem.ts";
import type { LimitingMethod } from "./circle-method.ts";
import { limitingCentre } from "./limiting-centre.ts";
import { contactsProve, type Contact, type Contacts } from "./limiting-contacts.ts";
import type { LocalFrame } from "./local-frame.ts";
import { refuseTip, residualsOf } from "./solve-wall.ts";
import type { WallReadings } from "./wall-readings.ts";

/** A limiting circle, or the two of a zone with the circle midway between them, in the station's plane. */
export interface LimitingCircle {
  readonly centre: PlaneVector;
  /** Of the limiting circle; of a zone the mean of its two. */
  readonly radiusMm: number;
  /** Distance from the centre − radius there, of every reading sent. */
  readonly residualsMm: readonly number[];
  readonly contacts: Contacts;
  /** How far away another centre lies that is as good within the tie asked for; null when there is none. */
  readonly tieAwayMm: number | null;
  readonly spacingMm: number;
  readonly cells: number;
}

/** Readings within this share of the radius of a limiting circle are contacts, or within rounding of their coordinates. */
const contactShare = 1e-9;
const contactSpacings = 4;
/** Ties of readings with no stated uncertainty: as near as contacts. */
const tieShare = 1e-9;

/**
 * The limiting circle of the readings that `frame` holds, by the criterion named, exact and the best of all, with its
 * contacts; `tangent` is that of a known taper's half angle. `tieMm`: values nearer than this are a tie; null where
 * no uncertainty says.
 * @throws ComputeError no_inscribed_circle, arc_too_flat, radius_not_positive, not_converged
 */
export function solveLimitingCircle(
  method: LimitingMethod,
  readings: WallReadings,
  frame: LocalFrame,
  tangent: number,
  used: readonly boolean[],
  tieMm: number | null,
  member: string,
): LimitingCircle {
  const problem = centreProblemOf(frame, tangent);
  const unitMm = problem.unit * frame.scaleMm;
  const tieWithin = tieMm === null ? tieShare : Math.max(tieShare, tieMm / unitMm);
  const { centre, tie, cells } = limitingCentre(method, problem, frame, tieWithin, member);
  const theta = Float64Array.of(centre.x * problem.unit, centre.y * problem.unit);
  const excessMm = residualsOf(readings, { theta, meanExcess: 0 }, { tangent, free: "nothing" }, frame);
  const { mostMm, leastMm } = extremesOf(excessMm, used);
  const distanceMm = Math.hypot(theta[0]!, theta[1]!) * frame.scaleMm;
  const contacts = contactsOf(method, readings, frame, theta, excessMm, used);
  if (!contactsProve(method, contacts)) throw unproved(method, member);
  const middleMm = {
    minimum_zone: (mostMm + leastMm) / 2,
    maximum_inscribed: leastMm,
    minimum_circumscribed: mostMm,
  }[method];
  const toPlane = frame.origin.zMm / frame.scaleMm;
  refuseTip(
    frame,
    (distanceMm + (method === "minimum_zone" ? leastMm : middleMm)) / frame.scaleMm,
    tangent,
    toPlane,
  );
  return {
    centre: {
      hMm: frame.origin.hMm + (frame.originRest.hMm + frame.scaleMm * theta[0]!),
      vMm: frame.origin.vMm + (frame.originRest.vMm + frame.scaleMm * theta[1]!),
    },
    radiusMm: distanceMm + middleMm - frame.origin.zMm * tangent,
    residualsMm: excessMm.map((excess) => excess - middleMm),
    contacts,
    tieAwayMm: tie === null ? null : Math.hypot(tie.x - centre.x, tie.y - centre.y) * unitMm,
    spacingMm: frame.spacingMm,
    cells,
  };
}

function extremesOf(excessMm: readonly number[], used: readonly boolean[]) {
  let mostMm = -Infinity;
  let leastMm = Infinity;
  for (let i = 0; i < excessMm.length; i++) {
    if (!used[i]!) continue;
    mostMm = Math.max(mostMm, excessMm[i]!);
    leastMm = Math.min(leastMm, excessMm[i]!);
  }
  return { mostMm, leastMm };
}

/** The readings in use on the limiting circles of the method. */
function contactsOf(
  method: LimitingMethod,
  { hMm, vMm }: WallReadings,
  { origin, originRest, scaleMm, spacingMm }: LocalFrame,
  theta: Float64Array,
  excessMm: readonly number[],
  used: readonly boolean[],
): Contacts {
  const { mostMm, leastMm } = extremesOf(excessMm, used);
  const distanceMm = Math.hypot(theta[0]!, theta[1]!) * scaleMm;
  const within = (limitMm: number) =>
    Math.max(contactShare * Math.abs(distanceMm + limitMm), contactSpacings * spacingMm);
  const contact = (index: number): Contact => ({
    index,
    angleRad: Math.atan2(
      vMm[index]! - origin.vMm - originRest.vMm - scaleMm * theta[1]!,
      hMm[index]! - origin.hMm - originRest.hMm - scaleMm * theta[0]!,
    ),
  });
  const at = (limitMm: number) =>
    excessMm.flatMap((excess, i) =>
      used[i]! && Math.abs(excess - limitMm) <= within(limitMm) ? [contact(i)] : [],
    );
  return {
    outer: method === "maximum_inscribed" ? [] : at(mostMm),
    inner: method === "minimum_circumscribed" ? [] : at(leastMm),
  };
}

function unproved(method: LimitingMethod, member: string): ComputeError {
  if (method === "maximum_inscribed") {
    const detail =
      "No largest circle without a reading inside it has its centre between the readings: it grows toward the gap they leave.";
    return new ComputeError("no_inscribed_circle", detail, { at: [member] });
  }
  const detail = "The contacts of the circle found do not prove it the best one.";
  return new ComputeError("not_converged", detail, { at: [member] });
}
