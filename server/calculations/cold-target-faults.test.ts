import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { schemaFaults } from "../http/schema-faults.ts";
import type { Fault } from "../../shared/error-codes.ts";
import { coldTargetRequest, type ColdTargetRequest } from "../../shared/schemas/cold-targets.ts";
import { coldMachineMm as base } from "../../tests/support/cold-target-requests.ts";
import { CalculationRefusal } from "./calculation-kind.ts";
import { coldTargetKind } from "./cold-target.ts";

function faultsOf(request: ColdTargetRequest): readonly Fault[] {
  expect(schemaFaults(coldTargetRequest, request)).toEqual([]);
  try {
    coldTargetKind.answer(request);
  } catch (error) {
    if (error instanceof CalculationRefusal) return error.faults;
    throw error;
  }
  return [];
}
const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`).sort();
const refused = (request: Partial<ColdTargetRequest>) => places(faultsOf({ ...base, ...request }));
const refusedRotor = (rotor: Partial<NonNullable<ColdTargetRequest["rotor"]>>) =>
  refused({ rotor: { ...base.rotor!, ...rotor } });
const refusedWire = (wire: Partial<NonNullable<ColdTargetRequest["wire"]>>) =>
  refused({ wire: { ...base.wire!, ...wire } });
const growth = { length: 700, coefficient: 1e-5, hot: 90, cold: 20 };

describe("coldTargetKind.answer: refusals", () => {
  it("accepts the machine that the refusals below are made from", () => {
    expect(refused({})).toEqual([]);
  });

  it("names every fault of every station, of the rotor and of the wire at once", () => {
    const [first, second, ...rest] = base.stations;
    const request: ColdTargetRequest = {
      ...base,
      units: { axial: "mm", bore: "mm", offset: "mm" },
      stations: [
        { ...first!, growth: { ...growth, coefficient: null } },
        { ...second!, id: "brg-1", growth: [growth, { ...growth, material: "steel_1020" }] },
        { id: "far", z: 99_999, follows: "rotor" },
        ...rest,
      ],
      rotor: {
        ...base.rotor!,
        sections: [{ length: 8000, outer: 300, inner: 300 }],
        masses: [{ z: -401, mass: 1 }],
        supports: [{ z: 0 }, { z: 9000 }, { z: 0 }],
        journals: [
          { z: 5, running: { h: 0, v: 0 } },
          { z: 0, running: { h: 0, v: 0 } },
          { z: 0, running: { h: 0, v: 0 } },
        ],
      },
      wire: { ...base.wire!, hungMass: 3 },
    };
    expect(places(faultsOf(request))).toEqual(
      [
        "/units/temperature units_missing",
        "/units/mass units_missing",
        "/units/force units_missing",
        "/units/density units_missing",
        "/units/modulus units_missing",
        "/stations/0/growth/coefficient required",
        "/stations/1/id duplicate_id",
        "/stations/1/growth/1/coefficient combination_invalid",
        "/stations/2/z out_of_range",
        "/stations/2/z out_of_range",
        "/rotor/sections/0/inner combination_invalid",
        "/rotor/masses/0/z out_of_range",
        "/rotor/supports/1/z out_of_range",
        "/rotor/supports/2/z combination_invalid",
        "/rotor/journals/0/z unknown_reference",
        "/rotor/journals/2/z combination_invalid",
        "/wire/tension combination_invalid",
      ].sort(),
    );
  });

  it("asks for each further unit that the call uses, and for no other", () => {
    const units = { axial: "mm", bore: "mm", offset: "mm" } as const;
    const stations = base.stations.map(({ id, z, follows }) => ({ id, z, follows }));
    const { density: _, modulus: __, masses: ___, ...rotor } = base.rotor!;
    const bare = { units, stations, rotor: { ...rotor, material: "steel_4340" as const }, wire: null };
    expect(refused(bare)).toEqual([]);
    const grown = [{ ...stations[0]!, growth }, ...stations.slice(1)];
    expect(refused({ ...bare, stations: grown })).toEqual(["/units/temperature units_missing"]);
    const asked = (more: object) => refused({ ...bare, rotor: { ...bare.rotor, ...more } });
    expect(asked({ density: 7850 })).toEqual(["/units/density units_missing"]);
    expect(asked({ modulus: 200 })).toEqual(["/units/modulus units_missing"]);
    expect(asked({ masses: [{ z: 0, mass: 1 }] })).toEqual(["/units/mass units_missing"]);
    expect(asked({ masses: [] })).toEqual([]);
    const wire = { massPerLength: 0.001, span: [-600, 7600] };
    expect(refused({ ...bare, wire: { ...wire, hungMass: 9 } })).toEqual(["/units/mass units_missing"]);
    expect(refused({ ...bare, wire: { ...wire, tension: 9 } })).toEqual([
      "/units/force units_missing",
      "/units/mass units_missing",
    ]);
  });

  it("quotes the shaft's ends in the caller's unit", () => {
    const faults = faultsOf({
      ...base,
      units: { ...base.units, axial: "m" },
      stations: [{ id: "a", z: 9, follows: "rotor" }],
      rotor: {
        ...base.rotor!,
        z: -0.5,
        sections: [{ length: 8, outer: 300 }],
        masses: [],
        supports: [{ z: 0 }, { z: 7 }],
        journals: null,
      },
      wire: null,
    });
    expect(faults).toEqual([
      {
        pointer: "/stations/0/z",
        code: "out_of_range",
        detail: "It lies beyond the ends of the shaft.",
        value: 9,
        unit: "m",
        allowed: { min: -0.5, max: 7.5, unit: "m" },
      },
    ]);
  });

  it("lets a bearing stand beyond the shaft, and no station beyond the wire", () => {
    const stations = [{ id: "brg-9", z: 9000, follows: "bearing_line" as const }];
    expect(refused({ stations, wire: null })).toEqual([]);
    expect(refused({ stations })).toEqual(["/stations/0/z out_of_range"]);
  });

  it.each([[[]], [[{ z: 0 }]], [[{ z: 0 }, { z: 1e-7 }]], [[{ z: 100 }, { z: 100 }, { z: 100 }]]])(
    "refuses a shaft on %j",
    (supports) => {
      const found = refusedRotor({ supports, journals: [] });
      expect(found).toContain("/rotor/supports shaft_unsupported");
    },
  );

  it("asks for the density and modulus that neither the call nor the material gives", () => {
    const bare = { density: null, modulus: null };
    expect(refusedRotor(bare)).toEqual(["/rotor/density required", "/rotor/modulus required"]);
    expect(refusedRotor({ ...bare, material: "grey_iron_g3000" })).toEqual(["/rotor/modulus required"]);
    expect(refusedRotor({ ...bare, material: "grey_iron_g3000", modulus: 100 })).toEqual([]);
    expect(refusedRotor({ ...bare, material: "steel_4340" })).toEqual([]);
  });

  it("asks for a rotor where a station follows it", () => {
    expect(refused({ rotor: null })).toEqual(["/rotor required"]);
  });

  it("asks for exactly one of tension and hungMass, on a span with a length", () => {
    expect(refusedWire({ tension: null })).toEqual(["/wire/tension required"]);
    expect(refusedWire({ hungMass: 15 })).toEqual(["/wire/tension combination_invalid"]);
    expect(refusedWire({ span: [7600, -600] })).toEqual(["/wire/span combination_invalid"]);
    expect(refusedWire({ span: [0, 0] })).toEqual(["/wire/span combination_invalid"]);
  });

  it.each([
    ["C", -273.15],
    ["F", -459.67],
  ] as const)("refuses what is colder than absolute zero in %s", (temperature, zero) => {
    const units = { ...base.units, temperature };
    const stations = (cold: number) => [
      { ...base.stations[0]!, growth: { ...growth, hot: 20, cold } },
      ...base.stations.slice(2),
    ];
    expect(faultsOf({ ...base, units, stations: stations(zero) })).toEqual([]);
    expect(faultsOf({ ...base, units, stations: stations(zero - 0.01) })).toEqual([
      expect.objectContaining({
        pointer: "/stations/0/growth/cold",
        code: "out_of_range",
        unit: temperature,
        allowed: { min: zero, unit: temperature },
      }),
    ]);
  });
});

describe("coldTargetKind.faultsBesideSchema", () => {
  const beside = (body: unknown) => places([...coldTargetKind.faultsBesideSchema!(body, [])]);

  it("finds the faults of the sound parts beside those that the schema refuses", () => {
    const body = {
      ...base,
      units: { ...base.units, offset: "furlong", mass: undefined },
      stations: [
        { ...base.stations[0]!, follows: "the crowd", growth: { ...growth, material: "steel_1020" } },
        {
          ...base.stations[1]!,
          id: "brg-1",
          growth: [
            { ...growth, length: "long" },
            { ...growth, coefficient: null },
          ],
        },
        { ...base.stations[2]!, z: 8000 },
      ],
      rotor: {
        ...base.rotor!,
        sections: [...base.rotor!.sections.slice(1), { length: 800, outer: 360, inner: 400 }],
        supports: [{ z: 0 }, { z: "end" }, { z: 0 }],
      },
    };
    expect(beside(body)).toEqual(
      [
        "/units/mass units_missing",
        "/stations/0/growth/coefficient combination_invalid",
        "/stations/1/id duplicate_id",
        "/stations/1/growth/1/coefficient required",
        "/stations/2/z out_of_range",
        "/stations/2/z out_of_range",
        "/rotor/sections/2/inner combination_invalid",
        "/rotor/supports/2/z combination_invalid",
      ].sort(),
    );
  });

  it("does not judge places by a shaft, supports or a wire that cannot be read", () => {
    const rotor = { ...base.rotor!, sections: [{ length: -1, outer: 3 }], supports: [{}, {}] };
    const wire = { ...base.wire!, span: "all along" };
    expect(beside({ ...base, rotor, wire })).toEqual([]);
    expect(beside({ ...base, rotor: "steel", wire: [1] })).toEqual([]);
    expect(beside({ ...base, units: undefined })).toEqual([]);
  });

  it("makes something of any body", () => {
    fc.assert(
      fc.property(fc.anything(), fc.anything(), fc.anything(), (one, two, three) => {
        expect(Array.isArray(beside(one))).toBe(true);
        expect(Array.isArray(beside({ ...base, stations: one, rotor: two, wire: three }))).toBe(true);
        expect(Array.isArray(beside({ ...base, units: one, stations: [two, { growth: three }] }))).toBe(true);
        const rotor = { ...base.rotor!, sections: [one], supports: [two], journals: [three], masses: one };
        expect(Array.isArray(beside({ ...base, rotor }))).toBe(true);
      }),
    );
  });
});

describe("coldTargetRequest", () => {
  const faults = (body: unknown) => places(schemaFaults(coldTargetRequest, body));

  it("requires units, stations, ids, z and follows; of a rotor sections and supports; of a wire its mass and span", () => {
    const { units, stations } = base;
    expect(faults({})).toEqual(["/stations required", "/units units_missing"]);
    expect(faults({ units, stations: [{}] })).toEqual([
      "/stations/0/follows required",
      "/stations/0/id required",
      "/stations/0/z required",
    ]);
    expect(faults({ units, stations, rotor: {}, wire: {} })).toEqual([
      "/rotor/sections required",
      "/rotor/supports required",
      "/wire/massPerLength required",
      "/wire/span required",
    ]);
  });

  it("names every fault of one growth as of a list of them", () => {
    const [station] = base.stations;
    const bad = { length: "x", hot: 1, coefficient: 12, colour: "red" };
    const at = (pointer: string) => [
      `${pointer}/coefficient out_of_range`,
      `${pointer}/cold required`,
      `${pointer}/colour unknown_field`,
      `${pointer}/length wrong_type`,
    ];
    expect(faults({ ...base, stations: [{ ...station, growth: bad }] })).toEqual(at("/stations/0/growth"));
    expect(faults({ ...base, stations: [{ ...station, growth: [growth, bad] }] })).toEqual(
      at("/stations/0/growth/1"),
    );
    expect(faults({ ...base, stations: [{ ...station, growth: 7 }] })).toEqual([
      "/stations/0/growth wrong_type",
    ]);
  });

  it("quotes a limit in the further unit that the call states", () => {
    const [station] = base.stations;
    const stations = [{ ...station, growth: { ...growth, hot: -900 } }];
    expect(schemaFaults(coldTargetRequest, { ...base, stations })).toEqual([
      expect.objectContaining({
        pointer: "/stations/0/growth/hot",
        code: "out_of_range",
        unit: "C",
        allowed: { min: -460, max: 1e5, unit: "C" },
      }),
    ]);
  });
});
