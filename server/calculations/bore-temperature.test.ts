import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { alignmentRequest } from "../../shared/schemas/alignments.ts";
import type { Fault } from "../../shared/error-codes.ts";
import { boreFitRequest, type BoreFitRequest, type BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import { gaugeBore, pointsBore, targetBore, wireBore, type Of } from "../../tests/support/bore-requests.ts";
import { alignmentKind } from "./alignment.ts";
import { boreFitKind } from "./bore-fit.ts";
import { CalculationRefusal } from "./calculation-kind.ts";

type Bore = BoreFitRequest["bores"][number];

const units = { axial: "mm", bore: "mm", offset: "mm", temperature: "C" } as const;
const call = (bores: readonly Bore[], stated: BoreFitRequest["units"] = units): BoreFitRequest => ({
  units: stated,
  seen: "downstream",
  bores: [...bores],
});
const fits = (bores: readonly Bore[], stated?: BoreFitRequest["units"]): BoreFitResult[] => [
  ...boreFitKind.answer(boreFitRequest.parse(call(bores, stated))).result.bores,
];
function placesOf(request: BoreFitRequest): string[] {
  try {
    boreFitKind.answer(request);
  } catch (error) {
    if (error instanceof CalculationRefusal) return places(error.faults);
    throw error;
  }
  return [];
}
const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`).sort();

/** A ring of four points, exactly round, of this diameter. */
const ring = (diameter: number): Of<"points"> => ({
  id: "cas-3",
  form: "points",
  points: [0, 1, 2, 3].map((i) => ({
    h: [0, 1, 0, -1][i]! * (diameter / 2),
    v: [1, 0, -1, 0][i]! * (diameter / 2),
  })),
  readingUncertainty: 0.001,
});
/** By 12e-6 · 25; null where the diameter is. */
function expectReduced(at20C: number | null | undefined, diameter: number | null): void {
  if (diameter === null) expect(at20C).toBeNull();
  else expect(Math.abs(at20C! - diameter / 1.0003)).toBeLessThan(1e-11); // mm
}
const steelAt45 = { partTemperature: 45, partCoefficient: 12e-6 };

describe("the diameter of a bore at 20 °C", () => {
  it("is 0.36 mm smaller for a 1200 mm steel bore read at 45 °C, the diameter as read beside it", () => {
    // By hand: 1200 · 12e-6 · 25 = 0.36.
    const [fit] = fits([{ ...ring(1200.36), ...steelAt45, gaugeTemperature: 20, gaugeCoefficient: 0 }]);
    expect(Math.abs(fit!.diameter! - 1200.36)).toBeLessThan(1e-9); // mm
    expect(Math.abs(fit!.diameterAt20C! - 1200)).toBeLessThan(1e-9); // mm
    expect(Math.abs(fit!.temperatureCorrection!.diameter! + 0.36)).toBeLessThan(1e-9); // mm
    expect(fit!.temperatureCorrection).toMatchObject({ gaugeCoefficient: 0, partCoefficient: 12e-6 });
    expect(fit!.warnings).toEqual([]);
  });

  it("is the same in inches, mils and degrees Fahrenheit", () => {
    const inch = ring(1200.36 / 25.4);
    const stated = { ...steelAt45, gaugeTemperature: 30, gaugeMaterial: "stainless_304" as const };
    const [metric] = fits([{ ...ring(1200.36), ...stated }]);
    const [other] = fits(
      [
        {
          ...inch,
          readingUncertainty: 0.001 / 0.0254,
          partTemperature: 113, // 45 °C
          partCoefficient: 12e-6 / 1.8,
          gaugeTemperature: 86, // 30 °C
          gaugeMaterial: "stainless_304",
        },
      ],
      { axial: "in", bore: "in", offset: "mil", temperature: "F" },
    );
    expect(Math.abs(other!.diameterAt20C! * 25.4 - metric!.diameterAt20C!)).toBeLessThan(1e-9); // mm
    const [mil, mm] = [other, metric].map((fit) => fit!.temperatureCorrection!.diameter!);
    expect(Math.abs(mil! * 0.0254 - mm!)).toBeLessThan(1e-9); // mm
    // By hand: (1 + 17.2e-6 · 10)/(1 + 3e-4) − 1 = −1.2796e-4, of 1200.36 mm −0.1536 mm.
    expect(Math.abs(mm! + 0.1536)).toBeLessThan(5e-5); // mm
    expect(Math.abs(other!.temperatureCorrection!.gaugeCoefficient! * 1.8 - 17.2e-6)).toBeLessThan(1e-18);
  });

  it("leaves every other number of the fit as it is, in each form", () => {
    for (const bore of [gaugeBore, pointsBore, targetBore, wireBore]) {
      const [plain] = fits([bore]);
      const [warm] = fits([{ ...bore, ...steelAt45 }]);
      const { diameterAt20C, temperatureCorrection, warnings, ...rest } = warm!;
      const { warnings: before, ...expected } = plain!;
      expect(rest).toEqual(expected);
      expect(warnings.map(({ code }) => code)).toEqual([
        ...before.map(({ code }) => code),
        "one_temperature_stated",
      ]);
      expect(temperatureCorrection!.factor).toBe(1 / 1.0003);
      expectReduced(diameterAt20C, plain!.diameter);
    }
  });

  it("is null where the gauge's zero is arbitrary and for a turned target, as the diameter is", () => {
    for (const bore of [{ ...gaugeBore, zero: "arbitrary" as const }, targetBore]) {
      const [fit] = fits([{ ...bore, ...steelAt45 }]);
      expect(fit).toMatchObject({
        diameter: null,
        diameterAt20C: null,
        temperatureCorrection: { diameter: null },
      });
    }
  });

  it("stands beside the axes of an ellipse too, and nowhere without a temperature", () => {
    const points = Array.from({ length: 16 }, (_, i) => (i * Math.PI) / 8).map((t) => ({
      h: 300.3 * Math.sin(t),
      v: 300.1 * Math.cos(t),
    }));
    const oval: Of<"points"> = { id: "cas-4", form: "points", method: "ellipse", points };
    const [warm] = fits([{ ...oval, ...steelAt45 }]);
    const { major, minor, majorAt20C, minorAt20C } = warm!.ellipse!;
    expect(Math.abs(major! / majorAt20C! - 1.0003)).toBeLessThan(1e-14);
    expect(Math.abs(minor! / minorAt20C! - 1.0003)).toBeLessThan(1e-14);
    const [plain] = fits([oval]);
    expect("majorAt20C" in plain!.ellipse! || "diameterAt20C" in plain!).toBe(false);
  });
});

describe("an alignment of bores that were warm", () => {
  const folder = new URL("../../examples/requests/alignments/", import.meta.url);
  const sent = alignmentRequest.parse(
    JSON.parse(readFileSync(new URL("gauge-readings-to-shims.json", folder), "utf8")),
  );
  const request = {
    ...sent,
    bores: sent.bores.map((bore) =>
      bore.form === "turned_gauge" ? { ...bore, zero: "nominal" as const } : bore,
    ),
  };

  it("has their diameters at 20 °C, and the same axis, deviations and moves", () => {
    const warm = alignmentKind.answer({
      ...request,
      units: { ...request.units, temperature: "C" },
      bores: request.bores.map((bore) => ({
        ...bore,
        ...steelAt45,
        gaugeTemperature: 45,
        gaugeCoefficient: 0,
      })),
    });
    const { fits: plainFits, ...plain } = alignmentKind.answer(request).result;
    const { fits: warmFits, ...rest } = warm.result;
    expect(warm.units).toEqual({ ...request.units, temperature: "C" });
    expect(rest).toEqual(plain);
    const sized = plainFits.filter(({ diameter }) => diameter !== null);
    expect(sized.length).toBeGreaterThan(0);
    for (const [index, { diameterAt20C }] of warmFits.entries()) {
      expectReduced(diameterAt20C, plainFits[index]!.diameter);
    }
  });
});

describe("the faults of a bore's temperatures", () => {
  const faulty = [
    { ...ring(300), id: "a", partTemperature: 45 },
    { ...ring(300), id: "b", gaugeMaterial: "steel_1020" as const },
    { ...ring(300), id: "c", ...steelAt45, partMaterial: "steel_1020" as const },
    { ...ring(300), id: "d", gaugeTemperature: -274, gaugeCoefficient: 1e-5 },
    { ...ring(300), id: "e", partTemperature: 1020, partCoefficient: 1e-4 },
    { ...ring(300), id: "f", points: ring(300).points.slice(0, 2), partTemperature: 45 },
  ];

  it("are each named at their place, with what the fit itself meets", () => {
    expect(placesOf(call(faulty))).toEqual([
      "/bores/0/partCoefficient required",
      "/bores/1/gaugeTemperature required",
      "/bores/2/partCoefficient combination_invalid",
      "/bores/3/gaugeTemperature out_of_range",
      "/bores/4/partTemperature out_of_range",
      "/bores/5/partCoefficient required",
      "/bores/5/points too_few_points",
    ]);
  });

  it("name the unit of temperature once where it is not stated", () => {
    const { temperature: _temperature, ...lengths } = units;
    expect(placesOf(call([{ ...ring(300), ...steelAt45 }, faulty[0]!], lengths))).toEqual([
      "/bores/1/partCoefficient required",
      "/units/temperature units_missing",
    ]);
    expect(placesOf(call([ring(300)], lengths))).toEqual([]);
  });

  it("are named beside faults of the schema, in a bore fit and in an alignment", () => {
    const { temperature: _temperature, ...lengths } = units;
    const body = {
      ...call([faulty[2]!, { ...ring(300), id: "g", ...steelAt45 }], lengths),
      seen: "sideways",
      stations: [],
    };
    const schemaFaults: Fault[] = [{ pointer: "/seen", code: "choice_unknown", detail: "" }];
    const expected = ["/bores/0/partCoefficient combination_invalid", "/units/temperature units_missing"];
    expect(places(boreFitKind.faultsBesideSchema!(body, schemaFaults))).toEqual(expected);
    expect(places(alignmentKind.faultsBesideSchema!(body, schemaFaults))).toEqual(
      expect.arrayContaining(expected),
    );
  });

  it("do not grow where numbers are extreme: a result is finite or refused", () => {
    for (const partTemperature of [-273.15, 1e5]) {
      for (const partCoefficient of [-1e-3, 1e-3, 1e-12, 0]) {
        const request = call([{ ...ring(1e9), partTemperature, partCoefficient }]);
        const refused = placesOf(request);
        if (refused.length > 0) expect(refused).toEqual(["/bores/0/partTemperature out_of_range"]);
        else expect(Number.isFinite(fits(request.bores)[0]!.diameterAt20C)).toBe(true);
      }
    }
  });
});
