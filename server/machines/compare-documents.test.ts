import { describe, expect, it } from "vitest";
import { compareDocuments } from "./compare-documents.ts";

describe("compareDocuments", () => {
  const machine = {
    name: "Unit 2",
    stations: [
      { id: "brg-1", z: 0 },
      { id: "shr/1", z: 4200, target: { h: 0, v: -0.1 } },
    ],
    reference: ["brg-1", "shr/1"],
  };

  it("finds nothing between a document and its copy, whatever the order of members", () => {
    const { name, ...rest } = structuredClone(machine);
    expect(compareDocuments(machine, { ...rest, name })).toEqual([]);
  });

  it("names stations by id, with the slash escaped as RFC 6901 asks", () => {
    const changed = structuredClone(machine);
    const shroud = changed.stations[1];
    if (shroud?.target) shroud.target.v = -0.12;
    expect(compareDocuments(machine, changed)).toEqual([
      { pointer: "/stations/shr~11/target/v", from: -0.1, to: -0.12 },
    ]);
  });

  it("tells a station put in before the others as one difference", () => {
    const added = { id: "inlet", z: -100 };
    const changed = { ...machine, stations: [added, ...machine.stations] };
    expect(compareDocuments(machine, changed)).toEqual([{ pointer: "/stations/inlet", to: added }]);
    expect(compareDocuments(changed, machine)).toEqual([{ pointer: "/stations/inlet", from: added }]);
  });

  it("compares lists without ids place by place", () => {
    expect(compareDocuments(machine, { ...machine, reference: ["brg-1"] })).toEqual([
      { pointer: "/reference/1", from: "shr/1" },
    ]);
  });

  it("tells null from absent", () => {
    expect(compareDocuments({ a: null }, {})).toEqual([{ pointer: "/a", from: null }]);
  });
});
