import type { Cause, ReferenceNotice } from "../compute/confirmation/judge-reference.ts";

interface Warning {
  code: string;
  detail: string;
}

/** What a confirmation found that its reader must know, beside the judgement of the reference stations. */
export interface ConfirmationFindings {
  readonly notices: readonly ReferenceNotice[];
  readonly cause: Cause | null;
  readonly sameSetUp: boolean;
  readonly namesReference: boolean;
  readonly missingReference: readonly string[];
  readonly movedReference: readonly string[];
  readonly toldApart: readonly string[];
  readonly staleReference: readonly string[];
  readonly untested: readonly string[];
  readonly notInBoth: readonly string[];
  readonly unplanned: readonly string[];
  readonly unlogged: readonly string[];
  readonly bent: readonly string[];
  readonly noAxis: string | null;
}

/** The warnings of a confirmation, the gravest first. */
export function confirmationWarnings(findings: ConfirmationFindings): Warning[] {
  const { notices, missingReference, movedReference, staleReference } = findings;
  return [
    ...notices.map((notice) => warning(notice, noticeInWords(notice, findings))),
    ...about(
      "reference_moved",
      movedReference,
      (ids) => `${ids} held the axis and was moved: survey the axis anew.`,
    ),
    ...about(
      "reference_missing",
      missingReference,
      (ids) => `${ids} is not in both surveys: whether it repeats is not shown.`,
    ),
    ...about(
      "reference_not_remeasured",
      staleReference,
      (ids) =>
        `${ids} was measured before the last move: what it says about the axis is older than the moves.`,
    ),
    ...(findings.namesReference
      ? []
      : [
          warning("no_reference", "No reference station is named: nothing shows that the two surveys agree."),
        ]),
    ...about(
      "not_tested",
      findings.untested,
      (ids) => `${ids} has no covariance in one survey or the other: whether it changed is not told.`,
    ),
    ...about(
      "station_missing",
      findings.notInBoth,
      (ids) => `${ids} moved and is not in both surveys: what was achieved is not known.`,
    ),
    ...about(
      "move_not_planned",
      findings.unplanned,
      (ids) => `${ids} moved by the log, and nothing was planned.`,
    ),
    ...about(
      "move_not_logged",
      findings.unlogged,
      (ids) =>
        `${ids} was to move, and the log has no move of it: the later survey is taken to come after it.`,
    ),
    ...about(
      "plan_not_rigid",
      findings.bent,
      (ids) =>
        `What is planned at the supports of ${ids} is no move of a rigid part: the one that fits best was taken.`,
    ),
    ...(findings.noAxis === null ? [] : [warning("axis_not_determined", findings.noAxis)]),
  ];
}

function noticeInWords(
  notice: ReferenceNotice,
  { cause, sameSetUp, toldApart }: ConfirmationFindings,
): string {
  const names = toldApart.join(", ");
  switch (notice) {
    case "uncertainty_unknown":
      return "The reference stations have no covariances: whether they repeat cannot be told.";
    case "two_references_prove_nothing":
      return "With a new set-up the axis goes through both reference stations whatever they did: two prove nothing. Name a third.";
    case "two_references_cannot_tell":
      return "Fewer than three reference stations: one that moved cannot be told from a beam that shifted or tilted.";
    case "three_references_cannot_name":
      return "Of three reference stations with a new set-up one moved, and any of them could be it: a fourth would name it.";
    case "cause_undetermined":
      return cause === "several"
        ? "More than one reference station moved by itself: the axis through them is not to be relied on."
        : "More than one explanation fits the reference stations: measure again before anything is moved.";
    case "axis_moved":
      return "The reference stations share a shift or tilt: the beam or its support moved. Every other change is taken from them.";
    case "reference_moved_by_itself":
      return `Of the reference stations ${names} moved${sameSetUp ? "" : ", and was left out of the axis"}: find out why before the axis is used.`;
    case "station_not_controlled":
      return "A reference station alone holds one end of the axis, so that no change of it could show: name another near it.";
  }
}

function about(code: string, ids: readonly string[], sentence: (ids: string) => string): Warning[] {
  return ids.length === 0 ? [] : [warning(code, sentence(ids.join(", ")))];
}

const warning = (code: string, detail: string): Warning => ({ code, detail });
