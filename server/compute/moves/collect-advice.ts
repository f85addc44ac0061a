import type { Advice, StackChange } from "./move-plan.ts";
import { planes, type MoveProblem, type MoveStation, type Plane } from "./move-problem.ts";
import { modesOf } from "./rigid-freedom.ts";
import type { ChoiceSearch } from "./shared-choice.ts";
import { piecesOf } from "./shim-changes.ts";
import type { SolvedComponent } from "./solve-component.ts";
import { solvingOrder } from "./solving-order.ts";
import type { StationShift } from "./station-shifts.ts";

/** What the crew must know beside the numbers, about the plan as a whole and about each component. */
export function collectAdvice(
  problem: MoveProblem,
  solved: readonly SolvedComponent[],
  shiftOf: StationShift,
  search: ChoiceSearch | null,
): Advice[] {
  const moved = solved.filter((each) => each.moved);
  const bearings = moved
    .filter(({ component }) => component.kind === "bearing")
    .map(({ component }) => component.id);
  const movedReferences = problem.referenceIds.filter((id) => {
    const station = problem.stations.find((each) => each.id === id);
    return moved.some(
      (each) => each.component.stationIds.includes(id) || (station && shifts(each, shiftOf, station)),
    );
  });
  return [
    ...(problem.cutIncrementMm === null && problem.stock === null
      ? [{ code: "shims_not_chosen" } as const]
      : []),
    ...(search && !search.proved
      ? [{ code: "optimality_not_proved", betterBy: search.betterBy } as const]
      : []),
    ...(moved.some(({ places }) => places.length > 0) ? [{ code: "shim_practice" } as const] : []),
    ...solved.flatMap((each) => adviceOn(problem, each)),
    ...solved.flatMap((each) => shiftedAfterwards(problem, each, solved, shiftOf)),
    ...(bearings.length > 0 ? [{ code: "bearing_afterwards", componentIds: bearings } as const] : []),
    ...(movedReferences.length > 0
      ? [{ code: "axis_survey_anew", stationIds: movedReferences } as const]
      : []),
  ];
}

function shifts({ index, realised }: SolvedComponent, shiftOf: StationShift, station: MoveStation): boolean {
  const { hMm, vMm } = shiftOf(index, realised, station);
  return hMm !== 0 || vMm !== 0;
}

/** Stations of a part already served that a later move shifts: that part was not solved for it. */
function shiftedAfterwards(
  { components }: MoveProblem,
  { index, component, stations }: SolvedComponent,
  solved: readonly SolvedComponent[],
  shiftOf: StationShift,
): Advice[] {
  const order = solvingOrder(components);
  const later = solved.filter((each) => order.indexOf(each.index) > order.indexOf(index));
  const stationIds = stations
    .filter((station) => later.some((each) => shifts(each, shiftOf, station)))
    .map(({ id }) => id);
  return stationIds.length > 0 ? [{ code: "shifted_afterwards", componentId: component.id, stationIds }] : [];
}

/** Planes in which a tilt tolerance asks for a tilt that the supports cannot make. */
function untiltable({ component, stations, ideals }: SolvedComponent): Plane[] {
  if (!component.tiltTolerance || ideals.length === 0) return [];
  const zMm = stations.map((station) => station.zMm);
  return planes.filter((plane) => modesOf(component.supports, zMm, plane).every(({ perMm }) => perMm === 0));
}

function adviceOn(problem: MoveProblem, each: SolvedComponent): Advice[] {
  const { component, stations, ideals, moved } = each;
  const componentId = component.id;
  const heldReferences =
    component.allowReferenceMove || component.fixed ? [] : referencesOn(problem, stations);
  const open = ideals.filter(({ determined }) => !determined).flatMap((ideal) => ideal.planes);
  const limits = ideals.flatMap(({ hindrances }) => hindrances.map(({ limit }) => limit));
  const silent = stations.filter(({ tolerance }) => tolerance === null).map(({ id }) => id);
  const thick = overFourPieces(each);
  const tiltless = untiltable(each);
  const advice: (Advice | null)[] = [
    heldReferences.length > 0 ? { code: "reference_held", componentId, stationIds: heldReferences } : null,
    silent.length > 0 && ideals.length > 0
      ? { code: "stations_without_tolerance", componentId, stationIds: silent }
      : null,
    open.length > 0 && stations.length > 0
      ? { code: "tilt_not_determined", componentId, planes: open }
      : null,
    tiltless.length > 0 ? { code: "tilt_not_adjustable", componentId, planes: tiltless } : null,
    limits.length > 0 ? { code: "limit_reached", componentId, limits } : null,
    moved ? jackAdvice(each) : null,
    each.answer.stacks.some(({ place, changeMm }) => place === "key-bottom" && changeMm !== 0)
      ? { code: "key_bottom_cheeks", componentId }
      : null,
    thick.length > 0 ? { code: "stack_over_four_pieces", componentId, places: thick } : null,
  ];
  return advice.filter((one) => one !== null);
}

const referencesOn = ({ referenceIds }: MoveProblem, stations: readonly MoveStation[]): string[] =>
  stations.map(({ id }) => id).filter((id) => referenceIds.includes(id));

/** Where a support moves in a plane that none of its stacks sets. */
function jackAdvice({ component, places, answer }: SolvedComponent): Advice | null {
  const supports = component.supports.map(({ id }, index) => ({
    id,
    planes: planes.filter((plane) => {
      const move = answer.realised[index];
      const moves = (plane === "h" ? move?.hMm : move?.vMm) !== 0;
      const shimmed = places.some(
        ({ support, direction, bearsLoad }) =>
          support === index && bearsLoad && Math.abs(direction[plane]) > 1e-12,
      );
      return moves && !shimmed;
    }),
  }));
  const byJack = supports.filter((support) => support.planes.length > 0);
  return byJack.length > 0 ? { code: "set_by_jack", componentId: component.id, supports: byJack } : null;
}

/** Stacks that hold more than four pieces when they are done. */
function overFourPieces({ places, answer }: SolvedComponent): string[] {
  const count = (k: number, { addMm, removeMm }: StackChange) => {
    const stack = places[k]?.stack;
    return stack ? piecesOf(stack).length + addMm.length - removeMm.length : 0;
  };
  return answer.stacks
    .filter((stack, k) => count(k, stack) > 4)
    .map(({ supportId, place }) => `${supportId} ${place}`);
}
