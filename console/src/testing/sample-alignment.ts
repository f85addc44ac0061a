import { alignmentRequest, alignmentResponse } from "../../../shared/schemas/alignments.ts";
import type { CalculationRecord } from "../../../shared/schemas/calculations.ts";
import { axisRequest, boreRequest, moveRequest, sampleResponse, type SampledKind } from "./sample-records.ts";
import { sampleSummary } from "./samples.ts";

const resultOf = (kind: SampledKind) => sampleResponse(kind)["result"] as Record<string, unknown>;

/** The record of the whole chain in one call, put together from the samples of its parts. */
export function alignmentRecord(withMoves: boolean): CalculationRecord {
  const request = alignmentRequest.parse({
    units: boreRequest.units,
    seen: "downstream",
    bores: boreRequest.bores.map((bore) => ({ ...bore, station: bore.id })),
    stations: axisRequest.stations.map(({ id, z, target, tolerance }) => ({ id, z, target, tolerance })),
    axis: axisRequest.axis,
    ...(withMoves ? { components: moveRequest.components, shims: moveRequest.shims } : {}),
  });
  const { axis, stations, summary } = resultOf("axis-deviation");
  const { bores } = resultOf("bore-fit");
  const response = {
    ...sampleResponse("bore-fit"),
    kind: "alignment",
    cautions: [],
    result: { fits: bores, axis, stations, summary, moves: withMoves ? resultOf("shim-move") : null },
  };
  alignmentResponse.parse(response);
  return { ...sampleSummary({ kind: "alignment" }), request: { ...request }, response, problem: null };
}
