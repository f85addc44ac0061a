import { describe, expect, it } from "vitest";
import { machine } from "../../tests/support/job-entries.ts";
import type { LoggedMove } from "../../shared/schemas/job-entries.ts";
import type { ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import { moveEffectFlags, moveOrderFlags, stationsMovedBy } from "./move-order.ts";

describe("moveOrderFlags", () => {
  const plan = {
    components: [
      { id: "casing", realised: [{ support: "s", h: 0.1, v: 0 }] },
      { id: "bearing-2", realised: [{ support: "s", h: 0, v: 0.1 }] },
    ],
  } as unknown as ShimMoveResult;
  const at = "2026-11-06T08:00:00Z";
  const codes = (earlier: LoggedMove[], next: LoggedMove) =>
    moveOrderFlags(machine, plan, earlier, next).map(({ code }) => code);

  it("lets casings go first and bearings after", () => {
    const casing = { component: "casing", at, finished: true };
    expect(codes([], casing)).toEqual([]);
    expect(codes([casing], { component: "bearing-2", at, finished: true })).toEqual([]);
  });

  it("marks a bearing that moves before a casing that is planned", () => {
    expect(codes([], { component: "bearing-2", at, finished: true })).toEqual(["bearing_before_casing"]);
  });

  it("marks a bearing that moves before a casing that is only to be turned", () => {
    const still = [{ support: "s", h: 0, v: 0 }];
    const waiting = (roll: object) => {
      const components = [{ id: "casing", realised: still, roll }, plan.components[1]];
      const bearing = { component: "bearing-2", at, finished: true };
      return moveOrderFlags(machine, { components } as unknown as ShimMoveResult, [], bearing);
    };
    expect(waiting({ found: 1e-4, predicted: 0 }).map(({ code }) => code)).toEqual(["bearing_before_casing"]);
    expect(waiting({ found: 1e-4, predicted: 1e-4 })).toEqual([]);
  });

  it("marks a casing that moves after a bearing", () => {
    const casing = { component: "casing", at, finished: true };
    const bearing = { component: "bearing-2", at, finished: true };
    expect(codes([casing, bearing], casing)).toEqual(["casing_after_bearing"]);
  });

  it("marks what was not locked before the next", () => {
    const open = { component: "casing", at, finished: false };
    expect(codes([open], { component: "bearing-2", at, finished: true })).toEqual([
      "bearing_before_casing",
      "previous_not_locked",
    ]);
    expect(codes([open], { ...open, finished: true })).toEqual([]);
  });

  it("takes along what a component carries, and tells of reference stations", () => {
    expect(stationsMovedBy(machine, "casing").sort()).toEqual(["brg-2", "cas-1"]);
    expect(moveEffectFlags(machine, ["brg-1"], { component: "bearing-1" }).map(({ code }) => code)).toEqual([
      "reference_moved",
    ]);
  });
});
