import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import {
  badWire,
  everyFormMm,
  faultsOfThose,
  faultyBores,
  pointsBore,
  wireBore,
} from "../../tests/support/bore-requests.ts";
import { boreFitKind } from "./bore-fit.ts";

const beside = (body: unknown, schemaFaults: readonly Fault[] = []) =>
  boreFitKind.faultsBesideSchema!(body, schemaFaults).map(({ pointer, code }) => `${pointer} ${code}`);
const schemaFault = (pointer: string): Fault => ({
  pointer,
  code: "unknown_field",
  detail: "Not known here.",
});

describe("boreFitKind.faultsBesideSchema", () => {
  it("finds the faults of the sound bores beside one that the schema refuses", () => {
    const misspelt = { ...pointsBore, id: "odd", point: [] };
    const body = { ...everyFormMm, bores: [...faultyBores, misspelt] };
    expect(beside(body, [schemaFault("/bores/6/point")])).toEqual(faultsOfThose);
  });

  it("leaves a bore that the schema refused to the schema, except for its id", () => {
    const broken = { ...pointsBore, points: [{ h: 0 }] };
    expect(
      beside({ ...everyFormMm, bores: [pointsBore, broken] }, [schemaFault("/bores/1/points/0/v")]),
    ).toEqual(["/bores/1/id duplicate_id"]);
  });

  it("does not take bore 1 for faulty because bore 10 is", () => {
    const bores = [
      ...Array.from({ length: 10 }, (_, i) => ({ ...wireBore, id: `w${i}` })),
      { ...wireBore, id: 7 },
    ];
    const body = {
      ...everyFormMm,
      bores: bores.map((bore, i) => (i === 1 ? { ...bore, wire: badWire } : bore)),
    };
    expect(beside(body, [schemaFault("/bores/10/id")])).toEqual(["/bores/1/wire/wireDiameter required"]);
  });

  it("without sound units names what needs no number", () => {
    const body = { ...everyFormMm, units: { axial: "mm" }, bores: [...faultyBores] };
    expect(beside(body, [schemaFault("/units/bore")])).toEqual([
      "/bores/1/id duplicate_id",
      "/bores/5/method combination_invalid",
      "/bores/5/wire/wireDiameter required",
    ]);
  });
});
