import { describe, expect, it } from "vitest";
import { machineDocument, type MachineDocument } from "../../schemas/machines.ts";
import type { FigureTable } from "../figure-table.ts";
import {
  tabulateMachineComponents,
  tabulateMachineStacks,
  tabulateMachineSupports,
} from "./tabulate-machine-supports.ts";
import { tabulateStations } from "./tabulate-stations.ts";
import { shimSentences, tabulateIndicators, tabulateStock } from "./tabulate-stock.ts";

const machine: MachineDocument = machineDocument.parse({
  name: "Unit",
  downstream: "Toward the generator.",
  units: { axial: "mm", bore: "mm", offset: "mm" },
  stations: [
    { id: "brg-1", kind: "bearing", z: 0, nominalDiameter: 360, tolerance: { radial: 0.05 } },
    {
      id: "cas-1",
      label: "Aft casing",
      kind: "casing",
      z: 1200.5,
      target: { h: 0, v: -0.12 },
      tolerance: { h: 0.1, v: [-0.1, 0.05] },
    },
    { id: "seal-1", kind: "seal", z: 1800 },
  ],
  reference: ["brg-1"],
  components: [
    {
      id: "casing",
      kind: "casing",
      stations: ["cas-1"],
      supports: [
        {
          id: "feet",
          z: 1200,
          form: "feet",
          blocked: ["h"],
          travel: { v: [-0.5, 1] },
          stacks: { left: { thickness: 8, shims: [5, 3] }, right: { thickness: 8, max: 12 } },
        },
        { id: "ring", z: 1500, form: "pads", pads: [{ id: "p1", clockDeg: 180, stack: { thickness: 2 } }] },
      ],
    },
    { id: "seal", stations: ["seal-1"], fixed: true },
  ],
  shims: {
    stock: [{ thickness: 0.05, quantity: 4 }, { thickness: 1 }],
    cutToSize: { increment: 0.01 },
    reuse: true,
  },
  maximumIncrement: 0.25,
  indicators: [{ id: "di-1", component: "casing", z: 1200, clockDeg: 0 }],
});

const textOf = (table: FigureTable | null) =>
  table?.rows.map((row) =>
    row.map((cell) =>
      cell.kind === "text" ? cell.text : cell.kind === "number" ? cell.value : cell.verdict,
    ),
  );

describe("a machine as tables", () => {
  it("has every station with its target, marks those of the axis, and writes tolerances as they are", () => {
    expect(textOf(tabulateStations(machine))).toEqual([
      ["brg-1 (ref.)", "–", "bearing", 0, 360, 0, 0, "radial 0.0500"],
      ["cas-1", "Aft casing", "casing", 1200.5, null, 0, -0.12, "h ±0.1000, v −0.1000 to +0.0500"],
      ["seal-1", "–", "seal", 1800, null, 0, 0, "none"],
    ]);
  });

  it("says what a component carries and whether it may move", () => {
    expect(textOf(tabulateMachineComponents(machine))).toEqual([
      ["casing", "casing", "cas-1", "feet, ring", "–", "yes"],
      ["seal", "other", "seal-1", "–", "–", "no, fixed"],
    ]);
  });

  it("says how far a support can be moved in each direction", () => {
    expect(textOf(tabulateMachineSupports(machine))).toEqual([
      ["casing", "feet", "feet", 1200, "blocked", "−0.5000 to +1.0000"],
      ["casing", "ring", "pads", 1500, "unlimited", "unlimited"],
    ]);
  });

  it("has every stack, and says where its pieces are not known", () => {
    expect(textOf(tabulateMachineStacks(machine))).toEqual([
      ["casing", "feet", "left", 8, "5 + 3", null, null, null],
      ["casing", "feet", "right", 8, "not known", null, 12, null],
      ["casing", "ring", "p1, 180°", 2, "not known", null, null, null],
    ]);
  });

  it("has the stock, thickest first, and says what goes beside it", () => {
    expect(textOf(tabulateStock(machine))).toEqual([
      [1, "unlimited"],
      [0.05, 4],
    ]);
    expect(shimSentences(machine)).toEqual([
      "Shims are cut to whole multiples of 0.01 mm.",
      "Pieces taken out go back to stock.",
      "At most 0.25 mm is moved at once.",
    ]);
    expect(textOf(tabulateIndicators(machine))).toEqual([["di-1", "casing", 1200, 0, "outside"]]);
  });

  it("has no tables of what the machine does not have", () => {
    const bare = { units: machine.units, stations: machine.stations };
    expect([
      tabulateMachineComponents(bare),
      tabulateMachineSupports(bare),
      tabulateMachineStacks(bare),
      tabulateStock(bare),
      tabulateIndicators(bare),
    ]).toEqual([null, null, null, null, null]);
  });
});
