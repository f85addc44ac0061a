import { pointerOf } from "../../shared/pointer.ts";
import type { FewestMovesRequest, FewestMovesResult } from "../../shared/schemas/fewest-moves.ts";
import type { ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import type { Converter } from "../../shared/units.ts";
import type {
  FewestChoice,
  FewestMovesProblem,
  Infeasible,
  LimitSource,
} from "../compute/fewest-moves/fewest-moves-problem.ts";
import { mayMove } from "../compute/fewest-moves/machine-model.ts";
import type { Plane } from "../compute/moves/move-problem.ts";
import { carriersOf } from "../compute/moves/solving-order.ts";
import { limitInWords, pointerOfLimit, wordingFor } from "./move-words.ts";

type Advice = FewestMovesResult["advice"][number];

const listed = (items: readonly string[]): string => items.join(", ");

/** Why no choice brings every station inside, in words and pointers. */
export function writeInfeasible(
  request: FewestMovesRequest,
  problem: FewestMovesProblem,
  why: Infeasible,
  offset: Converter,
): NonNullable<FewestMovesResult["infeasible"]> {
  const { length } = wordingFor(asMoves(request), offset);
  const idOf = (station: number) => request.stations[station]!.id;
  if (why.cause === "uncertainty") {
    const margin = problem.marginMm > 0 ? ` and a margin of ${length(problem.marginMm)}` : "";
    const parts = why.stations.map(
      ({ station, plane, uncertaintyMm, halfWidthMm }) =>
        `${idOf(station)}${inPlane(plane)}: an expanded uncertainty of ${length(uncertaintyMm)}${margin} leaves nothing of a tolerance of ${length(halfWidthMm)}`,
    );
    return {
      cause: "uncertainty",
      reason: `${parts.join("; ")}.`,
      stations: distinct(why.stations.map(({ station }) => idOf(station))),
      limits: distinct(why.stations.map(({ station }) => pointerOf(["stations", station, "tolerance"]))),
    };
  }
  const stations = distinct(
    why.limits.flatMap((source) => (source.of === "station" ? [source.station] : [])),
  );
  const still = stations.flatMap((station) => whyStill(request, problem, station) ?? []);
  const sources = why.limits.map((source) => sourceInWords(request, source, offset));
  return {
    cause: "contradiction",
    reason: `These cannot all be met: ${sources.join("; ")}.${still.map((each) => ` ${each}`).join("")}`,
    stations: stations.map(idOf),
    limits: distinct(why.limits.map((source) => pointerOfSource(request, source, offset))),
  };
}

function sourceInWords(request: FewestMovesRequest, source: LimitSource, offset: Converter): string {
  const end = source.of !== "component" && source.side === "min" ? "least" : "most";
  switch (source.of) {
    case "float":
      return `the ${end} float of the axis in ${source.plane} at ${request.reference![source.reference]!.id}`;
    case "station": {
      const { id } = request.stations[source.station]!;
      return source.plane === null
        ? `${id} inside its tolerance`
        : `${id} inside the ${end} of its tolerance in ${source.plane}`;
    }
    case "component": {
      const wording = wordingFor(asMoves(request), offset);
      const { id } = request.components[source.component]!;
      return `${limitInWords(wording, source.component, source.limit)} of ${id}`;
    }
  }
}

function pointerOfSource(request: FewestMovesRequest, source: LimitSource, offset: Converter): string {
  switch (source.of) {
    case "float": {
      const at = ["reference", source.reference];
      const stated = request.reference![source.reference]!.float?.[source.plane];
      return pointerOf(stated ? [...at, "float", source.plane, source.side === "min" ? 0 : 1] : at);
    }
    case "station":
      return pointerOf(["stations", source.station, "tolerance"]);
    case "component":
      return pointerOfLimit(wordingFor(asMoves(request), offset), source.component, source.limit);
  }
}

/** A station that follows the axis alone, and why; null where some part that it follows may move. */
function whyStill(request: FewestMovesRequest, problem: FewestMovesProblem, station: number): string | null {
  const { id } = request.stations[station]!;
  const { components } = problem;
  const own = components.findIndex(({ stationIds }) => stationIds.includes(id));
  if (own < 0) return `${id} is carried by no component.`;
  const chain = [own, ...carriersOf(components, own)];
  if (chain.some((index) => mayMove(problem, components[index]!))) return null;
  const part = components[own]!;
  return part.fixed
    ? `${id} stays: ${part.id} is fixed.`
    : `${id} stays: ${part.id} holds a reference station and allowReferenceMove is not true.`;
}

/** What the crew must know beside the numbers. */
export function adviceOn(
  request: FewestMovesRequest,
  choice: FewestChoice,
  shimMoves: ShimMoveRequest | null,
  movedStations: readonly string[],
): Advice[] {
  const { predicted, search, axis, components } = choice;
  const idsOf = (those: readonly FewestChoice["predicted"][number][]) => listed(those.map(({ id }) => id));
  const unguarded = predicted.filter((each) => each.unguarded);
  const silent = predicted.filter(({ verdict }) => verdict === null);
  const atLimit = predicted.filter((each) => each.atLimit);
  const references = (request.reference ?? []).map(({ id }) => id);
  const movedReferences = references.filter((id) => movedStations.includes(id));
  const floats = axis.atReferences.some(({ hMm, vMm }) => hMm !== 0 || vMm !== 0);
  const heldBy = components.filter(({ fixed }, k) => fixed && request.components[k]!.fixed !== true);
  const advice: (Advice | null)[] = [
    components.some(({ moved }) => moved)
      ? null
      : {
          code: "nothing_moves",
          detail: floats
            ? "Every station conforms to the new axis as it stands: nothing has to move."
            : "Every station conforms as it stands: nothing has to move.",
        },
    floats
      ? {
          code: "axis_floats",
          detail:
            "The deviations answered are from the new axis, not from the one surveyed. Move instruments, targets and reports to it together.",
        }
      : null,
    shimMoves && handoverAdvice(shimMoves),
    search.proved
      ? null
      : {
          code: "optimality_not_proved",
          detail: `The search ended before its end was proved: a choice may exist that costs less, by ${Number(search.betterBy.toPrecision(6))} at most.`,
        },
    search.tied > 0
      ? {
          code: "other_choices",
          detail: `Moving other parts costs the same, in ${search.tied} further ${search.tied === 1 ? "way" : "ways"}; this one leaves the least sum of squared shares of the tolerances.`,
        }
      : null,
    choice.mustMove.length > 0
      ? {
          code: "limits_leave_out_staying",
          detail: `${listed(choice.mustMove.map((index) => request.components[index]!.id))}: travel or a stack's limits leave out staying, so it moves whatever the stations ask.`,
        }
      : null,
    atLimit.length > 0
      ? {
          code: "no_room_left",
          detail: `${idsOf(atLimit)}: nothing is left of the tolerance, so shims cut to size can put it outside. Send a margin.`,
        }
      : null,
    unguarded.length > 0
      ? {
          code: "uncertainty_not_known",
          detail: `${idsOf(unguarded)} without a covariance: judged by the deviation alone.`,
        }
      : null,
    silent.length > 0
      ? {
          code: "stations_without_tolerance",
          detail: `${idsOf(silent)} without a tolerance: asks for nothing and is carried along.`,
        }
      : null,
    heldBy.length > 0
      ? {
          code: "reference_held",
          detail: `${listed(heldBy.map(({ id }) => id))} stays: it holds a reference station. Send allowReferenceMove to move it.`,
        }
      : null,
    movedReferences.length > 0
      ? {
          code: "axis_survey_anew",
          detail: `The reference stations ${listed(movedReferences)} move: the axis must be surveyed anew before these numbers are used further.`,
        }
      : null,
  ];
  return advice.filter((one) => one !== null);
}

function handoverAdvice({ objective }: ShimMoveRequest): Advice {
  const first =
    "Shims are not chosen here, nor are pieces counted. Send shimMoves with shims added to POST /v1/shim-moves.";
  return objective
    ? {
        code: "shims_from_shim_moves",
        detail: `${first} By its objective ${objective} each part, solved by itself, comes inside.`,
      }
    : {
        code: "shims_from_shim_moves",
        detail: `${first} Solved part by part neither objective brings every station inside: narrow each support's travel to the moves answered here.`,
      };
}

/** The same machine as a call of shim-moves, for words and pointers that are the same in both. */
function asMoves({ units, stations, components }: FewestMovesRequest): ShimMoveRequest {
  return { units, stations, components: components.map(({ cost: _cost, ...component }) => component) };
}

const inPlane = (plane: Plane | null): string => (plane === null ? "" : ` in ${plane}`);
const distinct = <T>(items: readonly T[]): T[] => [...new Set(items)];
