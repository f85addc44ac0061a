import { cautions } from "../../shared/cautions.ts";
import type { Fault } from "../../shared/error-codes.ts";
import {
  alignmentRequest,
  type AlignmentRequest,
  type AlignmentResult,
} from "../../shared/schemas/alignments.ts";
import type { Units } from "../../shared/units.ts";
import { distinct, alignmentFaultsBesideSchema, pairingFaults, toAlignment } from "./alignment-faults.ts";
import { axisPart, boreFitPart, movesPart } from "./alignment-parts.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { axisDeviationFaults } from "./axis-deviation-faults.ts";
import { boreFitKind } from "./bore-fit.ts";
import { CalculationRefusal, type CalculationKind } from "./calculation-kind.ts";
import { attempt } from "./collect-faults.ts";
import { shimMoveKind } from "./shim-move.ts";
import { shimMoveFaults } from "./shim-move-faults.ts";

interface AlignmentAnswer {
  readonly units: Units;
  readonly seen: "downstream";
  readonly level: number;
  readonly result: AlignmentResult;
  readonly cautions: typeof cautions;
}

/**
 * POST /v1/alignments: fits, axis and moves in one call. Each part is the single call itself, on the part before it as
 * that would be served.
 */
export const alignmentKind: CalculationKind<AlignmentRequest, AlignmentAnswer> = {
  kind: "alignment",
  request: alignmentRequest,
  answer(request) {
    const { bores, stations } = request;
    const fitted = attempt([], () => boreFitKind.answer(boreFitPart(request)));
    const [fits] = fitted.results;
    const served = fits ? asServed(fits.result.bores) : [];
    const axisRequest = axisPart(request, served);
    // Without fits no station has a covariance, and then none is missing one: what depends on the fits is not judged.
    const axisFaults = axisDeviationFaults(axisRequest).map((fault) => atBore(fault, request));
    const planned = movesPart(request, []);
    const moveFaults = planned ? shimMoveFaults(planned).map(toAlignment) : [];
    const faults = [...pairingFaults(bores, stations), ...fitted.faults, ...axisFaults, ...moveFaults];
    if (!fits || faults.length > 0) throw new CalculationRefusal(distinct(faults));

    const { result: deviations, level } = axisDeviationKind.answer(axisRequest);
    const moveRequest = movesPart(request, asServed(deviations.stations));
    const moves = moveRequest && shimMoveKind.answer(moveRequest).result;
    const result = { fits: [...fits.result.bores], ...deviations, moves };
    return { units: request.units, seen: "downstream", level, result, cautions };
  },
  isLong: (request) =>
    boreFitKind.isLong?.(boreFitPart(request)) === true ||
    axisDeviationKind.isLong?.(axisPart(request, [])) === true ||
    (request.components !== undefined && shimMoveKind.isLong?.(movesPart(request, [])!) === true),
  faultsBesideSchema: alignmentFaultsBesideSchema,
};

/** A part's answer as a client would read it off the wire. */
function asServed<Value>(value: Value): Value {
  return JSON.parse(JSON.stringify(value)) as Value;
}

/** A covariance of the call comes from a bore: there a fault of it can be mended. */
function atBore(fault: Fault, { bores, stations }: AlignmentRequest): Fault {
  const [, index] = /^\/stations\/(\d+)\/covariance$/.exec(fault.pointer) ?? [];
  if (index === undefined) return fault;
  const bore = bores.findIndex(({ station }) => station === stations[Number(index)]?.id);
  return bore < 0 ? fault : { ...fault, pointer: `/bores/${bore}` };
}
