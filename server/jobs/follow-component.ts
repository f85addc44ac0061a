import type { BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import type { IndicationAnswer, IndicationRequest } from "../../shared/schemas/indications.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import { plannedBoreMoves } from "../../shared/planned-move.ts";
import { convertersFor } from "../../shared/units.ts";
import type { Fault } from "../../shared/error-codes.ts";
import { unknownReference } from "../calculations/common-faults.ts";
import { followMove } from "../compute/following/follow-move.ts";

/** Most that readings may differ from the rigid move, where the machine does not say: as POST /v1/shim-moves has it. */
const misfitDefaultMm = 0.02;

/** What an indication is read against: the plan, and where every bore stood in its survey. */
export interface FollowBasis {
  readonly machine: MachineDocument;
  readonly plan: ShimMoveResult;
  readonly fits: readonly BoreFitResult[];
}

type Followed = Omit<IndicationAnswer, "id" | "createdAt">;

/** What an indication refers to and its job does not have. */
export function indicationFaults({ machine, fits }: FollowBasis, indication: IndicationRequest): Fault[] {
  const component = machine.components?.find(({ id }) => id === indication.component);
  if (!component) return [unknownReference(["component"], "component of the machine")];
  const { indicators = [], sights = [] } = indication;
  const known = (machine.indicators ?? []).filter((one) => one.component === component.id);
  const measured = new Set(fits.map(({ id }) => id));
  if (indicators.length + sights.length === 0) {
    return [{ pointer: "", code: "too_few_items", detail: "Send at least one indicator or one sight." }];
  }
  return [
    ...indicators.flatMap(({ id }, index) =>
      known.some((one) => one.id === id)
        ? []
        : [unknownReference(["indicators", index, "id"], `indicator on ${component.id}`)],
    ),
    ...sights.flatMap(({ station }, index) =>
      measured.has(station)
        ? []
        : [unknownReference(["sights", index, "station"], "station of the plan's survey")],
    ),
  ];
}

/** How far a component has come, what is left at every support, which neighbour has moved more than it may. */
export function followComponent(basis: FollowBasis, indication: IndicationRequest): Followed {
  const { machine, plan, fits } = basis;
  const { offset, axial } = convertersFor(machine.units);
  const enough = machine.maximumMisfit ?? offset.fromMm(misfitDefaultMm);
  const component = machine.components?.find(({ id }) => id === indication.component);
  const own = new Set(component?.stations ?? []);
  const zOf = new Map(machine.stations.map(({ id, z }) => [id, z]));
  const changes = (indication.sights ?? []).map(({ station, centre }) => {
    const start = fits.find(({ id }) => id === station)?.centre ?? centre;
    return { station, change: { h: centre.h - start.h, v: centre.v - start.v } };
  });
  const mine = changes.filter(({ station }) => own.has(station));
  const indicators = (indication.indicators ?? []).flatMap(({ id, reading }) => {
    const indicator = machine.indicators?.find((one) => one.id === id);
    return indicator ? [{ indicator, reading }] : [];
  });
  const neighbours = changes
    .filter(({ station }) => !own.has(station))
    .map((one) => besideLimits(one, plan, indication.component, enough));
  const head = {
    plan: indication.plan,
    component: indication.component,
    at: indication.at,
    person: indication.person ?? null,
    indicators: indication.indicators ?? [],
    sights: indication.sights ?? [],
    units: { offset: machine.units.offset },
    neighbours,
  };
  const passed = neighbours
    .filter((one) => one.passed)
    .map(({ station }) => stop("neighbour_passed", `${station} has moved more than it may.`, { station }));
  if (mine.length + indicators.length === 0) return { ...head, supports: [], done: null, stop: passed };

  const followed = followMove({
    supports: (component?.supports ?? []).map(({ id, z, blocked }) => ({
      id,
      zMm: axial.toMm(z),
      blocked: blocked ?? [],
    })),
    wanted: plannedBoreMoves(plan.components.find(({ id }) => id === indication.component)).map(
      ({ support, h, v }) => ({ supportId: support, hMm: offset.toMm(h), vMm: offset.toMm(v) }),
    ),
    indicators: indicators.map(({ indicator, reading }) => ({
      zMm: axial.toMm(indicator.z),
      clockDeg: indicator.clockDeg,
      contact: indicator.contact ?? "outside",
      readingMm: offset.toMm(reading),
    })),
    sights: mine.map(({ station, change }) => ({
      zMm: axial.toMm(zOf.get(station) ?? 0),
      change: { hMm: offset.toMm(change.h), vMm: offset.toMm(change.v) },
    })),
    enoughMm: offset.toMm(enough),
  });
  const out = (valueMm: number | null) => (valueMm === null ? null : offset.fromMm(valueMm));
  const worst = Math.max(0, ...followed.residualsMm.map(Math.abs));
  return {
    ...head,
    supports: followed.supports.map(({ supportId, movedMm, leftMm }) => ({
      support: supportId,
      moved: { h: out(movedMm.h), v: out(movedMm.v) },
      left: { h: out(leftMm.h), v: out(leftMm.v) },
    })),
    done: followed.done,
    stop: [
      ...passed,
      ...followed.past.map((support) =>
        stop("gone_past", `${support} has gone past where it shall be.`, { support }),
      ),
      ...(offset.fromMm(worst) > enough
        ? [stop("readings_disagree", "The readings do not fit one rigid move: check indicators and bolts.")]
        : []),
      ...(followed.done ? [stop("move_complete", "Every support is where it shall be.")] : []),
    ],
  };
}

function besideLimits(
  {
    station,
    change,
  }: { readonly station: string; readonly change: { readonly h: number; readonly v: number } },
  plan: ShimMoveResult,
  component: string,
  enough: number,
): Followed["neighbours"][number] {
  const watched = plan.steps
    .find((step) => step.component === component)
    ?.watch.find((one) => one.station === station);
  // A neighbour that the plan does not shift shall not move at all.
  const stopAt = watched?.stopAt ?? { h: [-enough, enough], v: [-enough, enough] };
  const isOut = (value: number, [min = -Infinity, max = Infinity]: readonly number[]) =>
    value < min || value > max;
  return { station, change, stopAt, passed: isOut(change.h, stopAt.h) || isOut(change.v, stopAt.v) };
}

function stop(
  code: Followed["stop"][number]["code"],
  detail: string,
  at: { readonly station?: string; readonly support?: string } = {},
): Followed["stop"][number] {
  return { code, detail, station: at.station ?? null, support: at.support ?? null };
}
