import { pointerOf } from "../../shared/pointer.ts";
import type { ShimMoveRequest, ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import type { Converter } from "../../shared/units.ts";
import type { Advice, LimitPlace, Unreachable } from "../compute/moves/move-plan.ts";
import type { Plane } from "../compute/moves/move-problem.ts";

/** What the words of an answer are written from: the request as sent, and lengths in its own unit. */
export interface Wording {
  readonly request: ShimMoveRequest;
  readonly length: (mm: number) => string;
}

export function wordingFor(request: ShimMoveRequest, offset: Converter): Wording {
  const length = (mm: number) => `${Number(offset.fromMm(mm).toPrecision(6))} ${request.units.offset}`;
  return { request, length };
}

const listed = (items: readonly string[]): string => items.join(", ");
const planeNames = (planes: readonly Plane[]): string => planes.join(" and ");

/** Where in the request a limit stands. A least thickness that was not sent is 0, at the place it would have. */
export function pointerOfLimit({ request }: Wording, component: number, limit: LimitPlace): string {
  const at = ["components", component, "supports", limit.support];
  if (limit.of === "travel") {
    return pointerOf([...at, "travel", limit.plane, limit.side === "min" ? 0 : 1]);
  }
  const support = request.components[component]?.supports?.[limit.support];
  const pad = support?.form === "pads" ? support.pads.findIndex(({ id }) => id === limit.place) : -1;
  return pad < 0
    ? pointerOf([...at, "stacks", limit.place, limit.side])
    : pointerOf([...at, "pads", pad, "stack", limit.side]);
}

/** A limit of a component, named for a reader. */
export function limitInWords({ request }: Wording, component: number, limit: LimitPlace): string {
  const support = request.components[component]?.supports?.[limit.support]?.id ?? "";
  const end = limit.side === "min" ? "least" : "most";
  return limit.of === "travel"
    ? `the ${end} travel in ${limit.plane} at ${support}`
    : `the ${end} thickness of ${limit.place} at ${support}`;
}

/** Why the stations of a component do not all come inside their tolerances, and which limit of the request binds. */
export function writeUnreachable(
  wording: Wording,
  component: number,
  unreachable: Unreachable,
): NonNullable<ShimMoveResult["components"][number]["unreachable"]> {
  const { cause, worst } = unreachable;
  const { because, limit } = causeInWords(wording, component, unreachable);
  if (!worst) return { cause, reason: `${because}.`, limit };
  const ratio = Number(worst.ratio.toPrecision(3));
  return { cause, reason: `${because}; ${worst.stationId} is left at ${ratio} times its tolerance.`, limit };
}

function causeInWords(
  wording: Wording,
  component: number,
  unreachable: Unreachable,
): { because: string; limit: string | null } {
  const at = ["components", component];
  switch (unreachable.cause) {
    case "fixed":
      return { because: "The component is fixed", limit: pointerOf([...at, "fixed"]) };
    case "reference": {
      const index = (wording.request.reference ?? []).indexOf(unreachable.stationId);
      const because = `It holds the reference station ${unreachable.stationId} and allowReferenceMove is not true`;
      return { because, limit: pointerOf(["reference", index]) };
    }
    case "contradiction": {
      const limits = unreachable.limits.map((limit) => limitInWords(wording, component, limit));
      const [first] = unreachable.limits;
      return {
        because: `No move keeps all limits at once: ${listed(limits)}`,
        limit: first ? pointerOfLimit(wording, component, first) : null,
      };
    }
    case "limit": {
      const { limit, limitMm, wantedMm } = unreachable;
      const name = limitInWords(wording, component, limit);
      const because = `The limit that binds is ${name}: it stops at ${wording.length(limitMm)} where ${wording.length(wantedMm)} is asked`;
      return { because, limit: pointerOfLimit(wording, component, limit) };
    }
    case "blocked": {
      const support = wording.request.components[component]?.supports?.[unreachable.support]?.id ?? "";
      return {
        because: `The move in ${unreachable.plane} is blocked at ${support}`,
        limit: pointerOf([...at, "supports", unreachable.support, "blocked"]),
      };
    }
    case "rigid":
      return {
        because:
          wording.request.objective === "minimax"
            ? "No move of the part as one rigid piece brings all its bores inside"
            : "No least-squares move of the part as one rigid piece brings all its bores inside",
        limit: null,
      };
    case "tilt":
      return {
        because: `The tilt stays beyond its tolerance in ${planeNames(unreachable.planes)}`,
        limit: pointerOf([...at, "tilt"]),
      };
    case "shims":
      return {
        because: "The ideal move would do; the shims that can be cut do not",
        limit: pointerOf(["shims"]),
      };
    case "stock":
      return {
        because: "The ideal move would do; the shims at hand do not",
        limit: pointerOf(["shims", "stock"]),
      };
  }
}

/** One piece of advice as a sentence for the crew. */
export function adviceInWords(wording: Wording, advice: Advice): string {
  switch (advice.code) {
    case "shims_not_chosen":
      return "No shims were chosen: every change is the ideal one. Send stock, or cutToSize, for real shims.";
    case "shim_practice":
      return "At most four pieces in a stack, thin ones between thick ones, one material, flat and without burrs.";
    case "optimality_not_proved":
      return advice.betterBy === null
        ? "Components whose moves shift each other's stations share stock that is short: each was given the best of what those before it leave, and no better choice of all together was looked for."
        : `The search ended before its end was proved: a better choice of shims may exist, by ${Number(advice.betterBy.toPrecision(3))} at most in what is made least.`;
    case "stack_over_four_pieces":
      return `${advice.componentId}: more than four pieces at ${listed(advice.places)}. Replace them by fewer, thicker ones.`;
    case "set_by_jack": {
      const places = advice.supports.map(({ id, planes }) => `${id} in ${planeNames(planes)}`);
      return `${advice.componentId}: no stack sets ${listed(places)}. Set by jack against an indicator, and lock.`;
    }
    case "key_bottom_cheeks":
      return `${advice.componentId}: the change of key-bottom is that of its left cheek; clear the right cheek by as much.`;
    case "limit_reached": {
      const component = wording.request.components.findIndex(({ id }) => id === advice.componentId);
      const limits = advice.limits.map((limit) => limitInWords(wording, component, limit));
      return `${advice.componentId}: the move stops at ${listed(limits)}.`;
    }
    case "stations_without_tolerance":
      return `${advice.componentId}: ${listed(advice.stationIds)} without a tolerance; where others have one, these ask for nothing and are carried along.`;
    case "tilt_not_determined":
      return `${advice.componentId}: its stations do not set a tilt in ${planeNames(advice.planes)}; of equally good moves the smallest is taken.`;
    case "tilt_not_adjustable":
      return `${advice.componentId}: its supports cannot change its tilt in ${planeNames(advice.planes)}; a translation alone was solved.`;
    case "shifted_afterwards":
      return `${advice.componentId}: later moves shift ${listed(advice.stationIds)}, for which it was not solved. Measure again and solve again.`;
    case "bearing_afterwards":
      return `After moving ${listed(advice.componentIds)}: check cap crush, top clearance, journal contact, and rim and face of the coupling on every coupled shaft.`;
    case "reference_held":
      return `${advice.componentId} stays: it holds the reference stations ${listed(advice.stationIds)}. Send allowReferenceMove to move it.`;
    case "axis_survey_anew":
      return `The reference stations ${listed(advice.stationIds)} move: the axis must be surveyed anew before these numbers are used further.`;
  }
}
