import type { Fault } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import { pointerOf } from "../../shared/pointer.ts";
import { levelSchema } from "../../shared/schemas/common.ts";
import {
  measurementPlanRequest,
  plannedBore,
  wantedSchema,
  type PlannedBoreRequest,
  type WantedRequest,
} from "../../shared/schemas/measurement-plans.ts";
import { convertersFor, type Converter } from "../../shared/units.ts";
import { findToleranceFaults } from "../compute/conformity/find-tolerance-faults.ts";
import { planRefusal } from "../compute/planning/plan-measurement.ts";
import { faultOf } from "./collect-faults.ts";
import { duplicates, idsOf, listOf, membersOf, statedUnitsOrAny } from "./common-faults.ts";
import { placesOf, planInputOf, type PlanCall } from "./measurement-plan-input.ts";
import { readTolerance } from "./read-tolerance.ts";

type Place = readonly PropertyKey[];

/**
 * Every fault of the domain in a body, of its sound parts where others fail the schema: the same for a request that
 * passed its schema and for one that did not.
 */
export function measurementPlanFaults(body: unknown): Fault[] {
  const sent = membersOf(body);
  const bores = listOf(sent["bores"]);
  const tooLarge = sizeFaults(bores);
  if (bores.length > limits.boresPerCall || tooLarge.length > 0) return tooLarge;
  const units = statedUnitsOrAny(sent["units"]);
  const { offset } = convertersFor(units);
  const wanted = wantedSchema.safeParse(sent["wanted"]).data;
  const call: PlanCall & { readonly unsound: ReadonlySet<string> } = {
    level: levelSchema.safeParse(sent["level"]).data,
    wanted,
    readingUncertainty: measurementPlanRequest.shape.readingUncertainty.safeParse(sent["readingUncertainty"])
      .data,
    unsound: new Set(
      (["wanted", "readingUncertainty"] as const).filter(
        (name) => !measurementPlanRequest.shape[name].safeParse(sent[name]).success,
      ),
    ),
  };
  return [
    ...duplicates(idsOf(bores), (index) => ["bores", index, "id"]),
    ...wantedFaults(wanted, ["wanted"], offset),
    ...bores.flatMap((one, index) => {
      const bore = plannedBore.safeParse(one).data;
      return bore ? boreFaults(bore, ["bores", index], call, bores.length, offset) : [];
    }),
  ];
}

function boreFaults(
  bore: PlannedBoreRequest,
  at: Place,
  call: PlanCall & { readonly unsound: ReadonlySet<string> },
  bores: number,
  offset: Converter,
): Fault[] {
  const { reachable, read } = bore;
  const faults = wantedFaults(bore.wanted, [...at, "wanted"], offset);
  const wanted = bore.wanted ?? call.wanted;
  if (!wanted && !call.unsound.has("wanted")) {
    faults.push(required([...at, "wanted"], "State what is wanted, here or for the whole call."));
  }
  const uncertainty = bore.readingUncertainty ?? call.readingUncertainty ?? null;
  if (uncertainty === null && !call.unsound.has("readingUncertainty")) {
    const detail = "State the standard uncertainty of a reading, here or for the whole call.";
    faults.push(required([...at, "readingUncertainty"], detail));
  }
  const places = reachable ? placesOf(reachable).length : 0;
  if (places > limits.placesPerBore) {
    faults.push({
      pointer: pointerOf([...at, "reachable"]),
      code: "too_many_items",
      detail: `A bore has at most ${limits.placesPerBore} places; these are ${places}: take a wider step.`,
      value: places,
      allowed: { max: limits.placesPerBore },
    });
  }
  if (places === 0 && (read ?? []).length === 0) {
    const detail = "Nothing was read and nothing can be reached.";
    faults.push({ pointer: pointerOf([...at, "reachable"]), code: "too_few_points", detail });
  }
  if (faults.length > 0 || !wanted || uncertainty === null) return faults;
  return anglesFaults(bore, wanted, call, at, bores, offset);
}

/** Clock angles that leave the centre open whatever is read there. */
function anglesFaults(
  bore: PlannedBoreRequest,
  wanted: WantedRequest,
  call: PlanCall,
  at: Place,
  bores: number,
  offset: Converter,
): Fault[] {
  const refusal = planRefusal(planInputOf(bore, wanted, call, bores, offset));
  if (!refusal) return [];
  const member = refusal.details.at?.[0] === "places" ? "reachable" : "read";
  return [{ ...faultOf(refusal, []), pointer: pointerOf([...at, member]) }];
}

function wantedFaults(wanted: WantedRequest | null | undefined, at: Place, offset: Converter): Fault[] {
  if (!wanted || !("tolerance" in wanted)) return [];
  return findToleranceFaults(readTolerance(wanted.tolerance, offset)).map((error) => faultOf(error, at));
}

/** More readings, or more places, than one call takes. */
function sizeFaults(bores: readonly unknown[]): Fault[] {
  const sizes = [
    {
      what: "readings",
      count: countOf(bores, (bore) => listOf(bore["read"]).length),
      max: limits.readingsPerCall,
    },
    { what: "places", count: countOf(bores, placesIn), max: limits.placesPerCall },
  ];
  return sizes
    .filter(({ count, max }) => count > max)
    .map(({ what, count, max }) => ({
      pointer: "/bores",
      code: "call_too_large" as const,
      detail: `All bores of a call hold at most ${max} ${what} together; these hold ${count}.`,
      value: count,
      allowed: { max },
    }));
}

const countOf = (bores: readonly unknown[], count: (bore: Record<string, unknown>) => number): number =>
  bores.reduce<number>((sum, bore) => sum + count(membersOf(bore)), 0);

/** Places of a bore that has no more than it may; one that has is a fault of its own. */
function placesIn(bore: Record<string, unknown>): number {
  const reachable = plannedBore.shape.reachable.safeParse(bore["reachable"]).data;
  return reachable ? Math.min(limits.placesPerBore, placesOf(reachable).length) : 0;
}

function required(at: Place, detail: string): Fault {
  return { pointer: pointerOf(at), code: "required", detail };
}
