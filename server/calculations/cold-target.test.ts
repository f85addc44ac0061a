import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { coldMachineMm as base } from "../../tests/support/cold-target-requests.ts";
import {
  coldTargetRequest,
  coldTargetResponse,
  coldTargetResult,
  type ColdTargetRequest,
  type ColdTargetResult,
  type GrowthRequest,
} from "../../shared/schemas/cold-targets.ts";
import { coldTargetKind } from "./cold-target.ts";

const answer = (request: ColdTargetRequest) => coldTargetKind.answer(request).result;

const near = (got: number, wanted: number, size: number) =>
  expect(Math.abs(got - wanted), `${got} for ${wanted}`).toBeLessThanOrEqual(1e-10 * size);

describe("coldTargetKind.answer", () => {
  it("answers every station in the order sent, rotor and wire, in the shape of its schema", () => {
    const result = answer(base);
    expect(coldTargetResult.parse(result)).toEqual(result);
    expect(coldTargetKind.answer(base).units).toEqual(base.units);
    expect(coldTargetResponse.shape.units.parse(base.units)).toEqual(base.units);
    expect(result.stations.map(({ id }) => id)).toEqual(["brg-1", "cas-2", "shr-1", "brg-2", "cpl-1"]);
    expect(result.stations[0]!.parts).toEqual({
      line: { h: 0, v: 0 },
      growth: { h: 0, v: 11.7e-6 * 780 * 25 },
      closing: { h: 0, v: 0 },
    });
    near(result.stations[3]!.target.v, 0.12, 1);
    expect(result.stations[2]).not.toHaveProperty("uncertainty");
    near(result.stations[1]!.uncertainty!.v, 0.05, 1);
    near(result.stations[1]!.uncertainty!.h, 0.004, 1);
    expect(result.stations[1]!.growths.map(({ direction, coefficient }) => [direction, coefficient])).toEqual(
      [
        ["v", 11.7e-6],
        ["h", 17.2e-6],
        ["v", 11.4e-6],
      ],
    );
    expect(result.rotor!.supports.map(({ journal }) => journal)).toEqual([
      { h: 0.06, v: -0.11 },
      { h: 0.07, v: expect.closeTo(0, 12) as number },
    ]);
  });

  it("carries the rotor's whole weight, and lowers its middle as that weight does", () => {
    const { rotor, stations } = answer(base);
    const ring = (outer: number, inner: number) => (Math.PI / 4) * (outer ** 2 - inner ** 2);
    const kg = 7.85e-6 * (800 * ring(360, 0) + 6200 * ring(640, 150) + 900 * ring(380, 0)) + 1500;
    near(
      rotor!.supports.reduce((sum, { reaction }) => sum + reaction!.v, 0),
      kg * 9.80665,
      kg * 10,
    );
    expect(stations[2]!.parts.rotor!.v).toBeLessThan(-0.3);
  });

  it("takes a hung mass × 9.80665 m/s² for the tension", () => {
    const { tension: _, ...wire } = base.wire!;
    const hung = answer({ ...base, wire: { ...wire, hungMass: 15 } });
    expect(hung.stations.map(({ wireSag }) => wireSag)).toEqual(
      answer(base).stations.map(({ wireSag }) => wireSag),
    );
    // 0.00154 kg/m across 8.2 m under the weight of 15 kg: wL²/8H
    near(hung.wire!.greatestSagByParabola, (0.00154e-3 * 8200 ** 2) / (8 * 15), 1);
  });

  it("takes null for absent, and 0 for a start that is not stated", () => {
    const nulls = { growth: null, closing: null };
    const stations = base.stations.map((station) => ({ ...station, growth: null, closing: null }));
    const bare = base.stations.map(({ id, z, follows }) => ({ id, z: z + 400, follows }));
    expect(answer({ ...base, wire: null, stations })).not.toHaveProperty("wire");
    const rotor = { ...base.rotor!, z: null };
    const moved = {
      ...rotor,
      masses: rotor.masses!.map((one) => ({ ...one, z: one.z + 400 })),
      supports: rotor.supports.map((one) => ({ ...one, z: one.z + 400 })),
      journals: rotor.journals!.map((one) => ({ ...one, z: one.z + 400 })),
    };
    const shifted = answer({ ...base, wire: null, rotor: moved, stations: bare });
    const plain = answer({ ...base, wire: null, stations: stations.map((one) => ({ ...one, ...nulls })) });
    shifted.stations.forEach(({ target }, i) => near(target.v, plain.stations[i]!.target.v, 1));
  });

  it("takes density and modulus from the material, and lets either be stated instead", () => {
    const { density: _, modulus: __, ...rotor } = base.rotor!;
    const steel = answer({ ...base, rotor: { ...rotor, material: "steel_4340" } });
    expect(steel).toEqual(answer(base));
    const soft = answer({ ...base, rotor: { ...rotor, material: "steel_4340", modulus: 103.5 } });
    const sag = ({ stations }: ColdTargetResult) => stations[2]!.target.v;
    const rigid = answer({ ...base, rotor: { ...rotor, material: "steel_4340", density: 0, masses: [] } });
    near(sag(soft) - sag(rigid), 2 * (sag(steel) - sag(rigid)), 1);
  });

  it("answers reactions where a unit of force is stated, and not otherwise", () => {
    const { force: _, ...units } = base.units;
    const result = answer({ ...base, units, wire: null });
    expect(result.rotor!.supports.every((support) => !("reaction" in support))).toBe(true);
  });

  it("needs neither rotor nor further units for bearings that neither grow nor move", () => {
    const units = { axial: "mm", bore: "mm", offset: "mm" } as const;
    const result = answer({ units, stations: [{ id: "brg-1", z: 0, follows: "bearing_line" }] });
    expect(result).toEqual({
      stations: [
        {
          id: "brg-1",
          z: 0,
          follows: "bearing_line",
          target: { h: 0, v: 0 },
          parts: { line: { h: 0, v: 0 }, growth: { h: 0, v: 0 }, closing: { h: 0, v: 0 } },
          growths: [],
          warnings: [],
        },
      ],
    });
  });

  it("answers 2,000 stations on 500 sections, masses and supports", () => {
    const sections = Array.from({ length: 500 }, (_, i) => ({ length: 14, outer: 300 + (i % 7) * 40 }));
    const places = Array.from({ length: 500 }, (_, i) => i * 14);
    const request: ColdTargetRequest = {
      ...base,
      stations: Array.from({ length: 2000 }, (_, i) => ({ id: `s${i}`, z: i * 3.5, follows: "rotor" })),
      rotor: {
        ...base.rotor!,
        z: 0,
        sections,
        masses: places.map((z) => ({ z: z + 5, mass: 2 })),
        supports: places.map((z) => ({ z })),
        journals: places.map((z) => ({ z, running: { h: 0.01, v: -0.02 } })),
      },
    };
    const { stations, rotor } = answer(request);
    expect(stations).toHaveLength(2000);
    expect(rotor!.closure).toBeLessThan(1e-11);
  });

  it("answers every example request, in the shape of its schema", () => {
    const folder = new URL("../../examples/requests/cold-targets/", import.meta.url);
    const files = readdirSync(folder);
    expect(files.length).toBeGreaterThanOrEqual(2);
    for (const file of files) {
      const result = answer(coldTargetRequest.parse(JSON.parse(readFileSync(new URL(file, folder), "utf8"))));
      expect(coldTargetResult.parse(result)).toEqual(result);
      expect(result.stations.flatMap(({ warnings }) => warnings)).toEqual([]);
    }
  });
});

describe("coldTargetKind.answer: warnings", () => {
  const codes = (request: ColdTargetRequest) => answer(request).rotor!.warnings.map(({ code }) => code);

  it("names the supports where the journal's running place is not known", () => {
    expect(codes(base)).toEqual([]);
    const rotor = { ...base.rotor!, journals: base.rotor!.journals!.slice(1) };
    const [warning] = answer({ ...base, rotor }).rotor!.warnings;
    expect(warning).toMatchObject({
      code: "journal_not_given",
      detail: expect.stringContaining("z 0:") as string,
    });
  });

  it("tells of a support that would have to pull the shaft down", () => {
    const masses = [{ z: 7500, mass: 200_000 }];
    expect(codes({ ...base, rotor: { ...base.rotor!, masses } })).toEqual(["support_lifts"]);
  });

  it("tells of slopes that the theory does not hold for", () => {
    expect(codes({ ...base, rotor: { ...base.rotor!, modulus: 0.2 } })).toEqual(["slope_not_small"]);
  });

  it("tells of a bearing whose line is not given, and of growths without uncertainty beside others", () => {
    const [first, second, ...rest] = base.stations;
    const [grown, other] = second!.growth as GrowthRequest[];
    const stations = [
      { ...first!, z: 300 },
      { ...second!, growth: [grown!, { ...other!, uncertainty: null }] },
      ...rest,
    ];
    const found = answer({ ...base, stations }).stations.map(({ warnings }) =>
      warnings.map(({ code }) => code),
    );
    expect(found).toEqual([["line_not_given"], ["uncertainty_partial"], [], [], []]);
  });
});
