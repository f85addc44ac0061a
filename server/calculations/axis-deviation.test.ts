import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import {
  axisDeviationRequest,
  axisDeviationResult,
  type AxisDeviationRequest,
  type AxisDeviationResult,
} from "../../shared/schemas/axis-deviations.ts";
import { unitChoices, type Units } from "../../shared/units.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { asFoundMm as base, mm } from "../../tests/support/axis-requests.ts";

const answer = (request: AxisDeviationRequest) => axisDeviationKind.answer(request);

/** Exact by definition (international inch, 1959), stated here so that the service's own table is not its own witness. */
const millimetresPer = { mm: 1, um: 0.001, m: 1000, in: 25.4, mil: 0.0254, ft: 304.8 };

/** The same survey in other units. */
function inUnits(request: AxisDeviationRequest, units: Units): AxisDeviationRequest {
  const offset = (value: number) => value / millimetresPer[units.offset];
  const pair = ({ h, v }: { h: number; v: number }) => ({ h: offset(h), v: offset(v) });
  const side = (limit: number | number[]) => (typeof limit === "number" ? offset(limit) : limit.map(offset));
  return {
    ...request,
    units,
    stations: request.stations.map(({ tolerance, ...station }) => ({
      ...station,
      z: station.z / millimetresPer[units.axial],
      centre: pair(station.centre),
      ...(station.target ? { target: pair(station.target) } : {}),
      ...(station.targetUncertainty ? { targetUncertainty: pair(station.targetUncertainty) } : {}),
      ...(station.covariance
        ? { covariance: station.covariance.map((row) => row.map((cell) => offset(offset(cell)))) }
        : {}),
      ...(tolerance
        ? {
            tolerance:
              "radial" in tolerance
                ? { radial: offset(tolerance.radial) }
                : { h: side(tolerance.h), v: side(tolerance.v) },
          }
        : {}),
    })),
  };
}

const relative = (got: number, wanted: number, size = Math.abs(wanted)) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(1e-9 * size + 1e-18);

function expectSameInMm(got: AxisDeviationResult, units: Units, wanted: AxisDeviationResult): void {
  const f = millimetresPer[units.offset];
  const a = millimetresPer[units.axial];
  for (const plane of ["h", "v"] as const) {
    relative(got.axis[plane].at0 * f, wanted.axis[plane].at0);
    relative((got.axis[plane].slope * f) / a, wanted.axis[plane].slope);
    relative(got.axis.chiSquare![plane], wanted.axis.chiSquare![plane]);
  }
  for (const block of ["h", "v", "hv"] as const) {
    const [first, second] = [got.axis.covariance![block], wanted.axis.covariance![block]];
    [
      [0, 0, f * f],
      [0, 1, (f * f) / a],
      [1, 0, (f * f) / a],
      [1, 1, (f * f) / a / a],
    ].forEach(([i, j, factor]) => relative(first[i!]![j!]! * factor!, second[i!]![j!]!));
  }
  got.stations.forEach((station, i) => {
    const other = wanted.stations[i]!;
    relative(station.deviation.h * f, other.deviation.h, 0.1);
    relative(station.deviation.radial * f, other.deviation.radial, 0.1);
    relative(station.deviation.clockDeg!, other.deviation.clockDeg!, 360);
    relative(station.expandedUncertainty!.radial * f, other.expandedUncertainty!.radial);
    relative(station.expandedUncertainty!.k, other.expandedUncertainty!.k);
    relative(station.covariance![0]![1]! * f * f, other.covariance![0]![1]!, 1e-6);
    expect(station.verdict).toBe(other.verdict);
    if (other.ratio !== null) relative(station.ratio!, other.ratio);
  });
  expect(got.summary.conforms).toBe(wanted.summary.conforms);
}

type Planes = Record<"h" | "v", number>;
interface PlaneProof {
  readonly objective: number;
  readonly lowerBound: number;
  readonly multipliers: readonly { readonly id: string; readonly multiplier: number }[];
}
type CylinderProof = {
  readonly multipliers: readonly { readonly id: string; readonly h: number; readonly v: number }[];
};

describe("axisDeviationKind.answer", () => {
  it("answers axis, stations in the order sent, and a summary, in the shape of its schema", () => {
    const { units, level, result } = answer(base) as {
      units: Units;
      level: number;
      result: AxisDeviationResult;
    };
    expect({ units, level }).toEqual({ units: mm, level: 0.95 });
    expect(axisDeviationResult.parse(result)).toEqual(result);
    expect(result.axis.through).toEqual(["brg-1", "shr-2", "brg-2"]);
    expect(result.axis.dof).toBe(1);
    expect(result.stations.map(({ id, reference }) => [id, reference])).toEqual([
      ["brg-1", true],
      ["cas-2", false],
      ["shr-2", true],
      ["brg-2", true],
    ]);
    // brg-2 has no tolerance: it is counted nowhere
    const { conforms, undecided, exceeds, worst } = result.summary;
    expect(conforms + undecided + exceeds).toBe(3);
    expect(result.stations[3]).toMatchObject({ verdict: null, ratio: null });
    expect(worst).toEqual({ id: "cas-2", ratio: result.stations[1]!.ratio });
  });

  it.each(
    unitChoices.axial.flatMap((axial) =>
      unitChoices.offset.map((offset) => ({ axial, bore: "mm" as const, offset })),
    ),
  )("gives the same answer in $axial and $offset", (units) => {
    const inMm = answer(base).result;
    expectSameInMm(answer(inUnits(base, units)).result, units, inMm);
  });

  it("puts a station without target on the axis itself, and takes null for absent", () => {
    const bare = base.stations[1]!;
    const stations = base.stations.map((one) => (one === bare ? { ...one, target: { h: 0, v: 0 } } : one));
    expect(answer({ ...base, stations }).result).toEqual(answer(base).result);
    const nulls = { target: null, targetUncertainty: null, dof: null };
    const withNulls = base.stations.map((one) => (one === bare ? { ...one, ...nulls } : one));
    expect(answer({ ...base, stations: withNulls }).result).toEqual(answer(base).result);
  });

  it("names the first sent of equally bad stations as worst", () => {
    const stations = ["b", "a", "c"].map((id, z) => ({
      id,
      z,
      centre: { h: 0, v: z === 2 ? 0.01 : 0.03 },
      tolerance: { radial: 0.05 },
    }));
    const { summary } = answer({ units: mm, axis: { method: "line_of_sight" }, stations }).result;
    expect(summary).toEqual({ conforms: 0, undecided: 3, exceeds: 0, worst: { id: "b", ratio: 0.6 } });
  });

  it("tells that a zone or a weight does not count in this method", () => {
    const stations = base.stations.map((station) => ({ ...station, weight: 2 }));
    const { axis } = answer({ ...base, axis: { ...base.axis, zone: "cylinder" }, stations }).result;
    expect(axis.warnings.map(({ code }) => code)).toEqual(
      expect.arrayContaining(["zone_not_used", "weights_not_used"]),
    );
    const plain = answer({ ...base, axis: { ...base.axis, zone: "planes" } }).result;
    expect(plain.axis.warnings.map(({ code }) => code)).not.toContain("zone_not_used");
  });

  it("answers what minimum_zone attains in each plane, with its contacts by id and its proof", () => {
    const { axis } = answer({ ...base, axis: { ...base.axis, method: "minimum_zone" } }).result;
    // Three stations all touch. By hand, in h: 0.01, 0.02, −0.02 at 0, 5150, 6900; in v: −0.04, 0.03, 0.02.
    const share = 5150 / 6900;
    const bend = { h: 0.02 - 0.01 - share * (-0.02 - 0.01), v: 0.03 + 0.04 - share * (0.02 + 0.04) };
    const all = ["brg-1", "shr-2", "brg-2"];
    expect(axis.contacts).toEqual({ h: all, v: all });
    const { zoneWidth, optimality } = axis as {
      zoneWidth: Planes;
      optimality: Record<"h" | "v", PlaneProof>;
    };
    for (const plane of ["h", "v"] as const) {
      relative(zoneWidth[plane], Math.abs(bend[plane]));
      relative(optimality[plane].objective, Math.abs(bend[plane]) / 2);
      relative(optimality[plane].lowerBound, Math.abs(bend[plane]) / 2);
      expect(optimality[plane].multipliers.map(({ id }) => id)).toEqual(all);
      const signs = optimality[plane].multipliers.map(({ multiplier }) => Math.sign(multiplier));
      expect(signs).toEqual([-1, 1, -1].map((sign) => sign * Math.sign(bend[plane])));
    }
    for (const absent of ["chiSquare", "dof", "scatter", "sumAbsolute"])
      expect(axis).not.toHaveProperty(absent);
  });

  it("answers a cylinder by one diameter, one list of contacts and one proof; a sum likewise", () => {
    const cylinder = (method: "minimum_zone" | "least_absolute") =>
      answer({ ...base, axis: { ...base.axis, method, zone: "cylinder" } }).result;
    const zone = cylinder("minimum_zone");
    const farthest = Math.max(...zone.stations.filter((s) => s.reference).map((s) => s.deviation.radial));
    relative(zone.axis.zoneWidth as number, 2 * farthest);
    expect(zone.axis.contacts).toEqual(["brg-1", "shr-2", "brg-2"]);
    expect((zone.axis.optimality as CylinderProof).multipliers.map(({ id }) => id)).toEqual(
      zone.axis.contacts,
    );
    const sum = cylinder("least_absolute");
    expect(sum.axis.contacts).toEqual(["brg-1", "brg-2"]);
    relative(sum.axis.sumAbsolute as number, sum.stations[2]!.deviation.radial);
    expect(sum.axis).not.toHaveProperty("zoneWidth");
  });

  it("answers distances without their weights, and the objective with them", () => {
    const stations = base.stations.map((station, i) => (i === 1 ? station : { ...station, weight: i + 1 }));
    for (const method of ["minimum_zone", "least_absolute"] as const) {
      const { axis, stations: found } = answer({ ...base, axis: { ...base.axis, method }, stations }).result;
      const used = found.filter(({ reference }) => reference).map(({ deviation }) => Math.abs(deviation.v));
      const heavy = [1, 3, 4].map((weight, i) => weight * used[i]!);
      const { objective } = (axis.optimality as Record<"v", PlaneProof>).v;
      const add = (values: number[]) => values.reduce((total, value) => total + value, 0);
      if (method === "minimum_zone") {
        relative((axis.zoneWidth as Planes).v, 2 * Math.max(...used));
        relative(objective, Math.max(...heavy));
      } else {
        relative((axis.sumAbsolute as Planes).v, add(used));
        relative(objective, add(heavy));
      }
      expect(axis.warnings).toEqual([]);
    }
  });

  it("tells that a weight counts at reference stations only", () => {
    const stations = base.stations.map((station, i) => ({ ...station, weight: i + 1 }));
    const { axis } = answer({ ...base, axis: { ...base.axis, method: "minimum_zone" }, stations }).result;
    expect(axis.warnings.map(({ code }) => code)).toEqual(["weights_not_used"]);
  });

  it.each(
    (["minimum_zone", "least_absolute"] as const).flatMap((method) =>
      (["planes", "cylinder"] as const).flatMap((zone) =>
        unitChoices.offset.map((offset, i) => ({ method, zone, offset, axial: unitChoices.axial[i]! })),
      ),
    ),
  )("gives the same $method ($zone) in $axial and $offset", ({ method, zone, offset, axial }) => {
    const through = base.stations.map(({ id }) => id);
    const request = { ...base, axis: { method, zone, through } };
    const units: Units = { axial, bore: "mm", offset };
    const [got, wanted] = [answer(inUnits(request, units)).result, answer(request).result];
    const [f, a] = [millimetresPer[offset], millimetresPer[axial]];
    relative(got.axis.v.at0 * f, wanted.axis.v.at0, 0.1);
    relative((got.axis.v.slope * f) / a, wanted.axis.v.slope, 1e-4);
    relative(got.axis.covariance!.hv[0]![0]! * f * f, wanted.axis.covariance!.hv[0]![0]!, 1e-5);
    relative((got.axis.covariance!.h[1]![1]! * f * f) / a / a, wanted.axis.covariance!.h[1]![1]!);
    expect(got.axis.contacts).toEqual(wanted.axis.contacts);
    const extents = ({ axis }: AxisDeviationResult) =>
      [axis.zoneWidth ?? axis.sumAbsolute].flatMap((extent) =>
        typeof extent === "number" ? [extent] : [extent!.h, extent!.v],
      );
    extents(wanted).forEach((extent, i) => relative(extents(got)[i]! * f, extent));
    got.stations.forEach((station, i) => {
      relative(station.deviation.radial * f, wanted.stations[i]!.deviation.radial, 0.1);
      expect(station.verdict).toBe(wanted.stations[i]!.verdict);
    });
  });

  it("gives the same answer to the last bit again", () => {
    expect(JSON.stringify(answer(base))).toBe(JSON.stringify(answer(structuredClone(base))));
  });

  it("answers every example request, in the shape of its schema", () => {
    const folder = new URL("../../examples/requests/axis-deviations/", import.meta.url);
    const files = readdirSync(folder);
    expect(files.length).toBeGreaterThanOrEqual(2);
    for (const file of files) {
      const request = axisDeviationRequest.parse(JSON.parse(readFileSync(new URL(file, folder), "utf8")));
      const { result } = answer(request);
      expect(axisDeviationResult.parse(result)).toEqual(result);
    }
  });
});
