import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import { alignmentRequest, alignmentResult, type AlignmentRequest } from "../../shared/schemas/alignments.ts";
import { alignmentKind } from "./alignment.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { boreFitKind } from "./bore-fit.ts";
import { CalculationRefusal } from "./calculation-kind.ts";
import { shimMoveKind } from "./shim-move.ts";

const folder = new URL("../../examples/requests/alignments/", import.meta.url);
const read = (file: string): AlignmentRequest =>
  alignmentRequest.parse(JSON.parse(readFileSync(new URL(file, folder), "utf8")));
const base = read("gauge-readings-to-shims.json");
const wire = <Value>(value: Value): Value => JSON.parse(JSON.stringify(value)) as Value;

function faultsOf(request: AlignmentRequest): readonly Fault[] {
  try {
    alignmentKind.answer(request);
  } catch (error) {
    if (error instanceof CalculationRefusal) return error.faults;
    throw error;
  }
  return [];
}
const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`).sort();

describe("alignmentKind.answer", () => {
  it.each(["mm", "um", "in", "mil"] as const)(
    "equals what the single endpoints answer in turn, to the last bit, with offsets in %s",
    (offset) => {
      // The same numbers in another unit: another machine, the same chain.
      const request: AlignmentRequest = { ...base, units: { axial: "in", bore: "in", offset } };
      const { result } = wire(alignmentKind.answer(request));

      const { units, seen, level = 0.95, stations } = request;
      const bores = request.bores.map(({ station: _station, ...bore }) => bore);
      const fits = wire(boreFitKind.answer({ units, seen, level, bores })).result.bores;
      expect(result.fits).toEqual(fits);
      const deviations = wire(
        axisDeviationKind.answer({
          units,
          level,
          axis: request.axis,
          stations: stations.map((station) => {
            const fit = fits[request.bores.findIndex((bore) => bore.station === station.id)]!;
            return {
              ...station,
              centre: fit.centre,
              covariance: fit.covariance,
              dof: fit.expandedUncertainty!.dof,
            };
          }),
        }),
      ).result;
      expect({ axis: result.axis, stations: result.stations, summary: result.summary }).toEqual(deviations);
      const moves = wire(
        shimMoveKind.answer({
          units,
          level,
          stations: deviations.stations.map(({ id, z, deviation: { h, v }, ...station }, index) => ({
            id,
            z,
            deviation: { h, v },
            covariance: station.covariance,
            dof: station.expandedUncertainty!.dof,
            tolerance: stations[index]!.tolerance,
          })),
          reference: request.axis.through,
          components: request.components!,
          shims: request.shims,
          maximumIncrement: request.maximumIncrement,
        }),
      ).result;
      expect(result.moves).toEqual(moves);
    },
  );

  it("solves no moves without components", () => {
    const { components: _components, ...survey } = base;
    expect(alignmentKind.answer(survey).result.moves).toBeNull();
  });

  it("names the faults of bores, stations, axis and components at once, each once", () => {
    const [first, second, ...others] = base.bores;
    const request: AlignmentRequest = {
      ...base,
      bores: [
        { ...first!, form: "turned_gauge", readings: [] } as AlignmentRequest["bores"][number],
        { ...second!, station: "nowhere" },
        ...others,
      ],
      stations: [...base.stations, base.stations[0]!],
      axis: { method: "two_station", through: ["brg-1", "ghost"] },
      couplings: [{ component: "ghost", support: "feet-aft", station: "cas-2", h: 0, v: 0.1 }],
    };
    expect(places(faultsOf(request))).toEqual(
      [
        "/bores/0/readings too_few_points",
        "/bores/1/station unknown_reference",
        "/stations/1/id unknown_reference",
        "/stations/4/id duplicate_id",
        "/axis/through/1 unknown_reference",
        "/couplings/0/component unknown_reference",
      ].sort(),
    );
  });

  it("points at the bore that leaves a reference station without a covariance", () => {
    const [first, ...others] = base.bores;
    const three = { ...first!, readingUncertainty: null } as AlignmentRequest["bores"][number];
    if (three.form !== "turned_gauge") throw new Error("The example's first bore is read with a gauge.");
    const bores = [{ ...three, readings: three.readings.filter((_, k) => k % 3 === 0) }, ...others];
    expect(places(faultsOf({ ...base, bores }))).toEqual(["/bores/0 weights_incomplete"]);
  });

  it("answers every example request, in the shape of its schema", () => {
    const files = readdirSync(folder);
    expect(files.length).toBeGreaterThanOrEqual(2);
    for (const file of files) {
      const { result } = alignmentKind.answer(read(file));
      expect(alignmentResult.parse(result)).toEqual(result);
    }
  });
});

describe("alignmentKind.faultsBesideSchema", () => {
  const beside = (body: unknown) => places([...alignmentKind.faultsBesideSchema!(body, [])]);

  it("finds the faults of sound parts beside those that the schema refuses", () => {
    const body = {
      ...base,
      stations: [{ ...base.stations[0], z: "far" }, ...base.stations.slice(1)],
      bores: [{ ...base.bores[0], readings: [] }, ...base.bores.slice(1)],
      axis: { ...base.axis, through: ["brg-1", "ghost"] },
      maximumIncrement: "some",
    };
    expect(beside(body)).toEqual(["/axis/through/1 unknown_reference", "/bores/0/readings too_few_points"]);
  });

  it.each([null, 7, "text", [], {}, { bores: 1, stations: [null, 3], components: {} }])(
    "makes something of %j",
    (body) => {
      expect(Array.isArray(beside(body))).toBe(true);
    },
  );
});
