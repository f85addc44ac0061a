import { ComputeError } from "../compute-error.ts";
import type { PlaneVector } from "../plane.ts";
import { fitCommonLine } from "./common-line.ts";
import { allUnchanged, fixedFrame, lineFrame, testUnchanged, type Frame } from "./frame.ts";
import type { StationChange } from "./survey-change.ts";
import type { ChangeTest } from "./test-change.ts";

/**
 * Why reference stations do not repeat. common: all share a shift and a tilt, so the beam or its support moved. station:
 * one of them moved. common_and_station: both. several: more than one moved by itself. undetermined: the stations are too
 * few, or the change too small, to tell.
 */
export type Cause = "none" | "common" | "station" | "common_and_station" | "several" | "undetermined";

export type ReferenceNotice =
  | "uncertainty_unknown"
  | "two_references_prove_nothing"
  | "two_references_cannot_tell"
  | "three_references_cannot_name"
  | "cause_undetermined"
  | "axis_moved"
  | "reference_moved_by_itself"
  | "station_not_controlled";

export interface ReferenceStation {
  readonly index: number;
  /** As read, mm. */
  readonly change: PlaneVector;
  /** In the frame, mm. */
  readonly deviation: PlaneVector;
  readonly test: ChangeTest | null;
}

export interface ReferenceJudgement {
  /** Null: not shown either way. */
  readonly repeats: boolean | null;
  /** Null where `repeats` is. */
  readonly cause: Cause | null;
  /** Reference stations told apart as having moved by themselves. */
  readonly moved: readonly number[];
  /** What every other change is taken from. */
  readonly frame: Frame;
  /** Shift and tilt of the reference stations that did not move by themselves; null with fewer than two. */
  readonly shared: Frame["line"];
  readonly perStation: readonly ReferenceStation[];
  readonly notices: readonly ReferenceNotice[];
}

export interface ReferenceInput {
  readonly changes: readonly StationChange[];
  /** Indices of the reference stations that both surveys measured and nobody moved. */
  readonly reference: readonly number[];
  /** Whether more stations were named as reference than can be looked at. */
  readonly someMissing: boolean;
  readonly sameSetUp: boolean;
  readonly level: number;
}

/** Suspects that are left out in turn: those that stand out most. */
const suspectsMax = 3;

/**
 * Whether the reference stations repeat between two surveys, and, where they do not, what moved.
 *
 * Set-up untouched: each change is held against its own error. Where one fails and there are three or more, two
 * explanations are tried: a shift and tilt that all share (then their deviations from the common line pass), and one
 * station that moved (then all others pass as read). If one alone explains it, it is the cause; with four or more, both
 * together are tried last. New set-up: the shift and tilt between the surveys say nothing, the deviations from the common
 * line are held against theirs; two stations always lie on it, three show that something moved but not which. A
 * suspect is one whose leaving out lets the rest pass (data snooping; W. Baarda, A testing procedure for use in geodetic
 * networks, 1968, from memory). O(reference stations²).
 * @throws ComputeError rank_deficient — with a new set-up, where the reference stations lay no axis; result_overflow
 */
export function judgeReference(input: ReferenceInput): ReferenceJudgement {
  return input.sameSetUp ? judgeUntouched(input) : judgeNewSetUp(input);
}

function judgeUntouched(input: ReferenceInput): ReferenceJudgement {
  const { changes, reference, level } = input;
  const fixed = fixedFrame(changes);
  const tests = testUnchanged(fixed, reference, level);
  const failing = reference.filter((_, i) => tests[i]?.within === false);
  if (failing.length === 0) {
    const repeats = provenBy(tests, input) ? true : null;
    return answer(input, { repeats, cause: repeats && "none", frame: fixed, notices: unknownNotices(tests) });
  }
  const failed = { repeats: false, frame: fixed } as const;
  if (reference.length < 3) {
    const notices = ["two_references_cannot_tell"] as const;
    return answer(input, { ...failed, cause: "undetermined", notices });
  }
  const common = frameThrough(changes, reference);
  const isCommon = common !== null && allUnchanged(common, reference, level);
  const [alone] = failing.length === 1 ? failing : [];
  if (isCommon && alone !== undefined) {
    const notices = ["cause_undetermined"] as const;
    return answer(input, { ...failed, cause: "undetermined", notices });
  }
  if (isCommon) return answer(input, { ...failed, cause: "common", frame: common, notices: ["axis_moved"] });
  if (alone !== undefined) {
    const notices = ["reference_moved_by_itself"] as const;
    return answer(input, { ...failed, cause: "station", moved: [alone], notices });
  }
  const [suspect, second] = suspectsOf(input, common);
  if (suspect && !second) {
    const notices = ["axis_moved", "reference_moved_by_itself"] as const;
    const { index, frame } = suspect;
    return answer(input, { repeats: false, cause: "common_and_station", moved: [index], frame, notices });
  }
  return answer(input, {
    ...failed,
    cause: "several",
    moved: failing,
    notices: ["reference_moved_by_itself"],
  });
}

function judgeNewSetUp(input: ReferenceInput): ReferenceJudgement {
  const { changes, reference, level } = input;
  const common = frameThrough(changes, reference);
  if (!common) throw noAxis();
  if (reference.length < 3) {
    return answer(input, {
      repeats: null,
      cause: null,
      frame: common,
      notices: ["two_references_prove_nothing"],
    });
  }
  const tests = testUnchanged(common, reference, level);
  if (tests.every((test) => test?.within !== false)) {
    const repeats = provenBy(tests, input) ? true : null;
    return answer(input, {
      repeats,
      cause: repeats && "none",
      frame: common,
      notices: unknownNotices(tests, input),
    });
  }
  const failed = { repeats: false, cause: "undetermined", frame: common } as const;
  if (reference.length === 3) return answer(input, { ...failed, notices: ["three_references_cannot_name"] });
  const [suspect, second] = suspectsOf(input, common);
  if (suspect && second) return answer(input, { ...failed, notices: ["cause_undetermined"] });
  if (!suspect) return answer(input, { ...failed, cause: "several", notices: ["cause_undetermined"] });
  const { index, frame } = suspect;
  const notices = ["reference_moved_by_itself"] as const;
  return answer(input, { repeats: false, cause: "station", moved: [index], frame, notices });
}

/** Whether every station named was tested, and passed. */
function provenBy(
  tests: readonly (ChangeTest | null)[],
  { someMissing }: Pick<ReferenceInput, "someMissing">,
): boolean {
  return !someMissing && tests.length > 0 && tests.every((test) => test?.within === true);
}

function unknownNotices(tests: readonly (ChangeTest | null)[], input?: ReferenceInput): ReferenceNotice[] {
  if (tests.every((test) => test !== null)) return [];
  const isKnown = input?.reference.every((index) => input.changes[index]!.error !== null) ?? false;
  return [isKnown ? "station_not_controlled" : "uncertainty_unknown"];
}

/** The stations whose leaving out lets all others lie on a common line, with that line. Three must be left. */
function suspectsOf(
  { changes, reference, level }: ReferenceInput,
  common: Frame | null,
): { index: number; frame: Frame }[] {
  if (reference.length < 4 || !common) return [];
  const order = reference
    .map((index) => ({ index, size: common.statisticOf(index) ?? 0 }))
    .sort((one, other) => other.size - one.size);
  return order.slice(0, suspectsMax).flatMap(({ index }) => {
    const rest = reference.filter((other) => other !== index);
    const frame = frameThrough(changes, rest);
    return frame && allUnchanged(frame, rest, level) ? [{ index, frame }] : [];
  });
}

function noAxis(): ComputeError {
  const detail =
    "The reference stations lay no axis: they stand at one z, or the variances lie so far apart that one counts alone.";
  return new ComputeError("rank_deficient", detail, { at: ["reference"] });
}

function frameThrough(changes: readonly StationChange[], through: readonly number[]): Frame | null {
  const line = fitCommonLine(changes, through);
  return line && lineFrame(changes, line);
}

interface Finding {
  readonly repeats: boolean | null;
  readonly cause: Cause | null;
  readonly moved?: readonly number[];
  readonly frame: Frame;
  readonly notices: readonly ReferenceNotice[];
}

function answer(
  { changes, reference, level }: ReferenceInput,
  { repeats, cause, moved = [], frame, notices }: Finding,
): ReferenceJudgement {
  const stayed = reference.filter((index) => !moved.includes(index));
  const shared = frame.line ?? fitCommonLine(changes, stayed.length >= 2 ? stayed : reference);
  const tests = testUnchanged(frame, reference, level);
  return {
    repeats,
    cause,
    moved,
    frame,
    shared,
    perStation: reference.map((index, i) => ({
      index,
      change: changes[index]!.change,
      deviation: frame.changeOf(index),
      test: tests[i] ?? null,
    })),
    notices,
  };
}
