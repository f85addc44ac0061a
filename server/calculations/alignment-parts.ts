import type { AlignmentRequest } from "../../shared/schemas/alignments.ts";
import type { AxisDeviationRequest, AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { BoreFitRequest, BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import type { ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";

/** A member left out where it is not there: the single calls take no `undefined` for it. */
function given<Name extends string, Value>(
  name: Name,
  value: Value | undefined,
): Partial<Record<Name, Value>> {
  return value === undefined ? {} : ({ [name]: value } as Record<Name, Value>);
}

/** The first call of the chain: the bores, without the stations they name. */
export function boreFitPart({ units, seen, level, bores, monteCarlo }: AlignmentRequest): BoreFitRequest {
  return {
    units,
    seen,
    ...given("level", level),
    bores: bores.map(({ station: _station, ...bore }) => bore),
    ...given("monteCarlo", monteCarlo),
  };
}

/** The second call: each station with the centre of its bore, its covariance and its degrees of freedom as answered. */
export function axisPart(
  { units, level, axis, verdict, stations, bores, monteCarlo }: AlignmentRequest,
  fits: readonly BoreFitResult[],
): AxisDeviationRequest {
  const fitAt = new Map(bores.map(({ station }, index) => [station, fits[index]]));
  return {
    units,
    ...given("level", level),
    axis,
    ...given("verdict", verdict),
    ...given("monteCarlo", monteCarlo),
    stations: stations.map((station) => {
      const fit = fitAt.get(station.id);
      return {
        ...station,
        centre: fit?.centre ?? { h: 0, v: 0 },
        covariance: fit?.covariance ?? null,
        dof: fit?.expandedUncertainty?.dof ?? null,
      };
    }),
  };
}

/** The third call: each station with its deviation as answered. Null where there is nothing to move. */
export function movesPart(
  { stations, axis, ...request }: AlignmentRequest,
  deviations: readonly Pick<
    AxisDeviationResult["stations"][number],
    "deviation" | "covariance" | "expandedUncertainty"
  >[],
): ShimMoveRequest | null {
  const { units, level, components } = request;
  if (components === undefined) return null;
  return {
    units,
    ...given("level", level),
    stations: stations.map(({ id, z, tolerance }, index) => {
      const found = deviations[index];
      return {
        id,
        z,
        deviation: { h: found?.deviation.h ?? 0, v: found?.deviation.v ?? 0 },
        covariance: found?.covariance ?? null,
        dof: found?.expandedUncertainty?.dof ?? null,
        tolerance: tolerance ?? null,
      };
    }),
    reference: axis.through ?? [],
    components,
    ...given("shims", request.shims),
    ...given("objective", request.objective),
    ...given("maximumIncrement", request.maximumIncrement),
    ...given("maximumMisfit", request.maximumMisfit),
    ...given("indicators", request.indicators),
    ...given("couplings", request.couplings),
  };
}
