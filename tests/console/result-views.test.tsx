import { cleanup, render, screen, within } from "@testing-library/react";
import { afterEach, describe, expect, it } from "vitest";
import { CalculationResult } from "../../console/src/features/results/components/calculation-result.tsx";
import { computations, type CalculationKind } from "../../console/src/config/paths.ts";
import { writeSigned } from "../../shared/figures/write-number.ts";
import { calculationKinds } from "../../shared/schemas/calculations.ts";
import { documentedCalls, type DocumentedCall } from "./read-document.ts";

afterEach(cleanup);

function show(kind: CalculationKind, { request, response }: DocumentedCall) {
  return render(
    <CalculationResult
      kind={kind}
      request={request}
      response={response}
      chosen={null}
      onChoose={() => undefined}
    />,
  );
}

const captions = () =>
  screen.getAllByRole("table").map((table) => within(table).getByRole("caption").textContent);
const rowOf = (caption: string, id: string) =>
  [
    ...within(screen.getByRole("table", { name: caption })).getByRole("row", {
      name: new RegExp(`^${id}\\b`),
    }).children,
  ].map((cell) => cell.textContent);
const callNamed = (kind: CalculationKind, name: string): DocumentedCall => {
  const call = documentedCalls(computations[kind].path).find((each) => each.name === name);
  if (!call) throw new Error(`The document has no example ${name}.`);
  return call;
};
const resultOf = <Result,>({ response }: DocumentedCall) => (response as { result: Result }).result;

describe.each(calculationKinds)("every documented answer of %s", (kind) => {
  const calls = documentedCalls(computations[kind].path);

  it("is there", () => {
    expect(calls.length).toBeGreaterThan(0);
  });

  it.each(calls.map((call) => [call.name, call] as const))("%s is drawn", (_name, call) => {
    const { container } = show(kind, call);
    expect(screen.queryByText(/does not draw/)).toBeNull();
    expect(captions().length).toBeGreaterThan(0);
    expect(container.textContent).not.toMatch(/NaN|Infinity|undefined|\[object/);
  });
});

describe("cold targets", () => {
  it("stand with what each was made of, the growths, the shaft and the wire", () => {
    const call = callNamed("cold-target", "us-units-with-wire");
    show("cold-target", call);
    const { stations } = resultOf<{ stations: { id: string; target: { v: number }; wireSag: number }[] }>(
      call,
    );
    for (const { id, target, wireSag } of stations) {
      const row = rowOf("Cold targets, relative to the axis", id);
      expect(row[4]).toBe(writeSigned(target.v, 2));
      expect(row.at(-1)).toBe(wireSag.toFixed(2));
    }
    expect(captions()).toEqual([
      "Cold targets, relative to the axis",
      "Growth, cold to hot",
      "Shaft at its bearings, running",
      "Wire, sag at the middle of its span",
    ]);
  });

  it("have no column for what the call does not ask", () => {
    show("cold-target", callNamed("cold-target", "three-bearings-on-a-curved-line"));
    expect(screen.queryByText("wire sag")).toBeNull();
    expect(screen.queryByText("u of h")).toBeNull();
    expect(screen.getByText("reaction v")).toBeTruthy();
  });
});

describe("a confirmation", () => {
  const judgement = () => screen.getByLabelText("Judgement").textContent;

  it("says that reference stations repeat, what moved by itself, and what is still to be measured", () => {
    show("confirmation", callNamed("confirmation", "casing-moved-same-set-up"));
    expect(judgement()).toContain("reference stationsrepeat");
    expect(judgement()).toContain("moved without being meant tonoz-1");
    expect(screen.getByLabelText("Measure again").textContent).toContain(
      "Measure still, in this order1 dif-1",
    );
    expect(rowOf("Stations moved, planned and achieved", "cas-4")[1]).toBe("not as planned");
    expect(rowOf("Stations moved, planned and achieved", "dif-1").slice(1, 2)).toEqual(["not shown"]);
    expect(rowOf("Other stations, after less before", "noz-1")[1]).toBe("moved");
    expect(rowOf("Other stations, after less before", "shr-1")[1]).toBe("stayed");
  });

  it("names the reference station that moved, and takes changes off the line that the others share", () => {
    show("confirmation", callNamed("confirmation", "four-references-new-set-up"));
    expect(judgement()).toContain("do not repeat: one moved by itself (brg-2)");
    expect(judgement()).toContain("off the shift and tilt that the reference stations share");
    expect(rowOf("Reference stations, after less before", "brg-2")[1]).toBe("does not repeat");
  });

  it("says that two reference stations prove nothing", () => {
    show("confirmation", callNamed("confirmation", "two-references-in-mil"));
    expect(judgement()).toContain("not shown either way");
    expect(rowOf("Reference stations, after less before", "brg-1")[1]).toBe("not shown");
    expect(screen.getByRole("region", { name: "Warnings" })).toBeTruthy();
    expect(screen.queryByLabelText("Measure again")).toBeNull();
  });
});

describe("a repeatability study", () => {
  it("of one station shows scatter, drift and the reading farthest off", () => {
    show("repeatability-study", callNamed("repeatability-study", "one-station-with-drift"));
    expect(captions()).toEqual([
      "12 readings of brg-1",
      "Drift",
      "Reading farthest from the mean (kept)",
      "Six standard deviations, of the tolerance's width",
    ]);
    expect(rowOf("Drift", "h").at(-1)).toBe("chance");
    expect(rowOf("Drift", "v").at(-1)).toBe("significant");
    expect(screen.getByRole("region", { name: "Warnings" }).textContent).toContain("readings_drift");
  });

  it("of people shows both planes' analysis, the sources and the people", () => {
    show("repeatability-study", callNamed("repeatability-study", "crossed-three-people"));
    expect(rowOf("Analysis of variance, h", "person").slice(-2)).toEqual(["0.0011", "significant"]);
    expect(rowOf("Analysis of variance, v", "station")[5]).toBe("< 0.0001");
    expect(rowOf("People, from the mean of all", "trainee")[1]).toBe("−0.00442");
    expect(rowOf("Standard deviations of a single reading, by source", "repeatability")).toHaveLength(4);
  });

  it("leaves out the interaction that was pooled", () => {
    show("repeatability-study", callNamed("repeatability-study", "two-people-pooled-in-mil"));
    const table = screen.getByRole("table", { name: "Analysis of variance, h" });
    expect(within(table).queryByText("interaction")).toBeNull();
    expect(screen.getByText(/pooled above a probability of 0.25/)).toBeTruthy();
  });
});

describe("a measurement plan", () => {
  const plans = "Whether the readings do";
  const predictions = "What readings tell of the centre";

  it("says whether the readings do, where to add which, and whether fewer could do", () => {
    show("measurement-plan", callNamed("measurement-plan", "lower-halves-read"));
    expect(rowOf(plans, "brg-1")).toEqual([
      "brg-1",
      "enough when added",
      "radial 0.01250",
      "2",
      "2",
      "continuous relaxation",
      "is the least",
      "8",
    ]);
    expect(rowOf(plans, "cas-2")[6]).toBe("may not be the least");
    const added = within(screen.getByRole("table", { name: "Readings to add" }));
    expect(added.getAllByRole("row", { name: /^brg-1\b/ }).map(({ textContent }) => textContent)).toEqual([
      "brg-115.01",
      "brg-1345.01",
    ]);
    const told = within(screen.getByRole("table", { name: predictions }));
    expect(
      told.getAllByRole("row", { name: /^brg-1\b/ }).map(({ children }) => children[6]?.textContent),
    ).toEqual(["179", "88", "63"]);
  });

  it("says what is out of reach, and what h and v are wanted apart", () => {
    show("measurement-plan", callNamed("measurement-plan", "rotating-target-and-short-arc"));
    expect(rowOf(plans, "noz-3").slice(1, 2)).toEqual(["out of reach"]);
    expect(rowOf(plans, "noz-3").slice(4, 7)).toEqual(["–", "–", "none found"]);
    cleanup();
    show("measurement-plan", callNamed("measurement-plan", "blocked-arcs-in-mil"));
    expect(rowOf(plans, "shr-1")[2]).toMatch(/^h 0\.5\d*, v 0\.8\d*$/);
    const [read] = within(screen.getByRole("table", { name: predictions })).getAllByRole("row", {
      name: /^shr-1\b/,
    });
    expect(read?.textContent).toBe("shr-1those read––––––");
  });
});

describe("a line-of-sight set-up", () => {
  it("says what to do next, what each support moves, and what air does", () => {
    const call = callNamed("sight-line-setup", "two-supports-in-mil");
    show("sight-line-setup", call);
    expect(screen.getByLabelText("What to do next").textContent).toContain("Move the source");
    expect(captions()).toEqual([
      "Beam at the stations, off where it should pass",
      "Move of the source",
      "Drift and air",
    ]);
    const { adjustment } = resultOf<{ adjustment: { moves: { at: string; h: number; v: number }[] } }>(call);
    for (const { at, h, v } of adjustment.moves) {
      expect(rowOf("Move of the source", `at ${at}`).slice(2)).toEqual([
        writeSigned(h, 2),
        writeSigned(v, 2),
      ]);
    }
    expect(screen.getByRole("region", { name: "Warnings" }).textContent).toContain(
      "bend_exceeds_uncertainty",
    );
  });
});

describe("a bore fit", () => {
  it("has the diameter at 20 °C beside that read, only where it is asked", () => {
    show("bore-fit", callNamed("bore-fit", "diameters-at-20-degrees"));
    const [read, reduced] = rowOf("Centres and sizes", "cas-3").slice(5, 7).map(Number);
    expect(read! - reduced!).toBeGreaterThan(0.1); // mm
    cleanup();
    show("bore-fit", callNamed("bore-fit", "turned-gauge-with-sag"));
    expect(screen.queryByText("diameter at 20 °C")).toBeNull();
  });
});

describe("an answer of another version", () => {
  it.each(calculationKinds)("of %s is said not to be drawn", (kind) => {
    show(kind, { name: "other", request: {}, response: { result: {} } });
    expect(screen.getByText(/form the console does not draw/)).toBeTruthy();
  });
});
