import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { shimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import type { BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import { machineDocument } from "../../shared/schemas/machines.ts";
import { shimMoveKind } from "../calculations/shim-move.ts";
import { followComponent } from "./follow-component.ts";

const example = "../../examples/requests/shim-moves/carried-bearing-tilt-and-roll.json";
const request = shimMoveRequest.parse(JSON.parse(readFileSync(new URL(example, import.meta.url), "utf8")));
const component = "exhaust-casing";
const right = { id: "exhaust-right", component, z: 6240, clockDeg: 90, contact: "outside" } as const;
const machine = machineDocument.parse({
  name: "Rolled exhaust casing",
  downstream: "generator",
  units: request.units,
  stations: request.stations.map(({ id, z }) => ({ id, z, kind: "other" })),
  components: request.components,
  indicators: [...(request.indicators ?? []), right],
});
const { result: plan } = shimMoveKind.answer({ ...request, indicators: [...machine.indicators!] });
const fits = machine.stations.map(({ id }) => ({ id, centre: { h: 0, v: 0 } }) as BoreFitResult);
const basis = { machine, plan, fits };
const head = { plan: "p", component, at: "2026-11-06T08:00:00Z" };

/*
 * 0.00008 rad clockwise about a bore 650 mm above its feet: with the roll out, the bore has gone 0.052 mm to the left
 * beside the move of the feet (rigid body, small angles; shims cut to 0.01 mm leave a little of it).
 */
describe("followComponent of a part with a roll", () => {
  const moved = plan.components.find(({ id }) => id === component)!;
  const found = request.stations.find(({ id }) => id === "exh-1")!.deviation;
  const left = plan.predicted.find(({ id }) => id === "exh-1")!.deviation;
  const centre = { h: left.h - found.h, v: left.v - found.v };

  it("has its bore further to the left than its feet", () => {
    expect(Math.abs(centre.h - moved.realised[0]!.h + 650 * 8e-5)).toBeLessThan(0.002);
  });

  it("is done when the bore is sighted where the plan leaves it", () => {
    const answer = followComponent(basis, { ...head, sights: [{ station: "exh-1", centre }] });
    expect(answer.stop.map(({ code }) => code)).toEqual(["move_complete"]);
    expect(Math.abs(answer.supports[0]!.left.h!)).toBeLessThan(1e-12);
  });

  it("is done when every indicator reads what its last part says", () => {
    const indicators = plan.steps[0]!.increments.at(-1)!.indicators;
    expect(indicators.map(({ id }) => id)).toEqual(["exhaust-top", "exhaust-right"]);
    expect(Math.abs(indicators[1]!.reading - centre.h)).toBeLessThan(1e-12);
    const answer = followComponent(basis, { ...head, indicators });
    expect(answer.stop.map(({ code }) => code)).toEqual(["move_complete"]);
  });

  it("is not done when the bore stands only where the feet were to go", () => {
    const { h, v } = moved.realised[0]!;
    const answer = followComponent(basis, { ...head, sights: [{ station: "exh-1", centre: { h, v } }] });
    expect(answer.done).toBe(false);
    expect(Math.abs(answer.supports[0]!.left.h! - (centre.h - h))).toBeLessThan(1e-12);
  });
});
