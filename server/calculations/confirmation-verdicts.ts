import type { AxisDeviationRequest } from "../../shared/schemas/axis-deviations.ts";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import type { ConfirmationRequest } from "../../shared/schemas/confirmations.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { axisDeviationFaults } from "./axis-deviation-faults.ts";

/** The later survey as POST /v1/axis-deviations would judge it, or why no axis can be laid. */
export type Verdicts =
  | { readonly verdicts: ConfirmationResult["verdicts"]; readonly noAxis: null }
  | { readonly verdicts: []; readonly noAxis: string };

/** Verdicts of every station measured after, from an axis through the reference stations that stayed. */
export function verdictsAfter(
  { units, level, after, axis, verdict }: ConfirmationRequest,
  stayed: readonly string[],
): Verdicts {
  const method = axis?.method ?? "least_squares";
  if (method === "least_squares" && stayed.length < 2) {
    const noAxis =
      "Fewer than two reference stations are left to lay the axis through: no verdicts. Name more, or say that the beam is the axis (line_of_sight).";
    return { verdicts: [], noAxis };
  }
  const call: AxisDeviationRequest = {
    units,
    ...(level === undefined ? {} : { level }),
    axis: { method, through: method === "least_squares" ? [...stayed] : [] },
    stations: after.stations,
    ...(verdict === undefined ? {} : { verdict }),
  };
  const [fault] = axisDeviationFaults(call);
  if (fault)
    return { verdicts: [], noAxis: `No axis can be laid after, so there are no verdicts: ${fault.detail}` };
  const { stations } = axisDeviationKind.answer(call).result;
  return { verdicts: stations.map(({ z: _z, ...station }) => station), noAxis: null };
}
