import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { findOutstanding, type OutstandingInput, type SurveyEvent } from "./find-outstanding.ts";
import { achievedRatio, rigidMove } from "./planned-move.ts";

describe("rigidMove", () => {
  it("runs straight through two supports, and carries on past them", () => {
    const { at, misfitMm } = rigidMove([
      { zMm: 1000, move: { hMm: 0.1, vMm: 0 } },
      { zMm: 3000, move: { hMm: -0.1, vMm: 0.4 } },
    ]);
    expect(at(2000)).toEqual({ hMm: 0, vMm: 0.2 });
    expect(Math.abs(at(4000).vMm - 0.6)).toBeLessThan(1e-15);
    expect(misfitMm).toBeLessThan(1e-15);
  });

  it("only translates on one support, or on several at one z", () => {
    const alone = rigidMove([{ zMm: 500, move: { hMm: 0.1, vMm: -0.2 } }]);
    expect(alone.at(-9000)).toEqual({ hMm: 0.1, vMm: -0.2 });
    const pair = rigidMove([
      { zMm: 500, move: { hMm: 0.1, vMm: 0.2 } },
      { zMm: 500, move: { hMm: 0.3, vMm: 0.2 } },
    ]);
    expect(pair.at(7000)).toEqual({ hMm: 0.2, vMm: 0.2 });
    expect(Math.abs(pair.misfitMm - 0.1)).toBeLessThan(1e-15);
  });

  it("fits three that no rigid part can follow, and says by how much, worked by hand", () => {
    // Least squares of 0, 0.3, 0 over −1, 0, 1: 0.1 everywhere, 0.2 off in the middle
    const { at, misfitMm } = rigidMove(
      [0, 0.3, 0].map((vMm, i) => ({ zMm: i * 100, move: { hMm: 0, vMm } })),
    );
    expect(Math.abs(at(100).vMm - 0.1)).toBeLessThan(1e-15);
    expect(Math.abs(misfitMm - 0.2)).toBeLessThan(1e-15);
  });
});

describe("achievedRatio", () => {
  it("is (achieved·planned)/|planned|²: what lies across the plan does not count", () => {
    expect(achievedRatio({ hMm: 0.3, vMm: 0.4 }, { hMm: 0.3, vMm: 0.4 })).toBeCloseTo(1, 12);
    expect(achievedRatio({ hMm: -0.4, vMm: 0.3 }, { hMm: 0.3, vMm: 0.4 })).toBe(0);
    expect(achievedRatio({ hMm: -0.3, vMm: 0 }, { hMm: 0.6, vMm: 0 })).toBe(-0.5);
    expect(achievedRatio({ hMm: 1, vMm: 1 }, { hMm: 0, vMm: 0 })).toBeNull();
  });

  it("does not lose itself in sizes that no machine has", () => {
    expect(achievedRatio({ hMm: 1e-200, vMm: 0 }, { hMm: 2e-200, vMm: 0 })).toBe(0.5);
    expect(achievedRatio({ hMm: 1e200, vMm: 0 }, { hMm: 2e200, vMm: 0 })).toBe(0.5);
  });
});

const moved = (...stationIds: string[]): SurveyEvent => ({ event: "moved", stationIds });
const measured = (...stationIds: string[]): SurveyEvent => ({ event: "measured", stationIds });
const ids = ["ref-1", "a", "b", "c", "ref-2"];
const input = (extra: Partial<OutstandingInput>): OutstandingInput => ({
  referenceIds: ["ref-2", "ref-1"],
  stationIds: ids,
  plannedIds: new Set(),
  measuredIds: new Set(ids),
  events: [],
  ...extra,
});

describe("findOutstanding", () => {
  it("lists reference stations first, in the order named, then what moved, in the order sent", () => {
    const events = [measured(...ids), moved("c"), moved("a"), measured("b")];
    expect(findOutstanding(input({ events }))).toEqual(["ref-2", "ref-1", "a", "c"]);
  });

  it("takes off what was measured after the last move: its own, and for a reference station any", () => {
    const events = [moved("a"), measured("a", "ref-1", "ref-2"), moved("c"), measured("c", "ref-1")];
    expect(findOutstanding(input({ events }))).toEqual(["ref-2"]);
    expect(findOutstanding(input({ events: [...events, moved("a")] }))).toEqual(["ref-2", "ref-1", "a"]);
  });

  it("lists what the later survey lacks, whatever the log says", () => {
    const measuredIds = new Set(["ref-1", "a", "ref-2"]);
    const events = [moved("b"), measured("b", "ref-1", "ref-2")];
    expect(findOutstanding(input({ events, measuredIds }))).toEqual(["b"]);
    expect(findOutstanding(input({ plannedIds: new Set(["b", "a"]), measuredIds }))).toEqual(["b"]);
  });

  it("lists nothing where nothing moved", () => {
    expect(findOutstanding(input({ events: [measured("a")], measuredIds: new Set() }))).toEqual([]);
  });

  it("agrees with the plain definition on any log", () => {
    const event = fc
      .tuple(fc.constantFrom("measured" as const, "moved" as const), fc.subarray(ids, { minLength: 1 }))
      .map(([of, at]): SurveyEvent => ({ event: of, stationIds: at }));
    fc.assert(
      fc.property(
        fc.array(event, { maxLength: 12 }),
        fc.subarray(ids),
        fc.subarray(ids),
        (events, planned, has) => {
          const got = findOutstanding(
            input({ events, plannedIds: new Set(planned), measuredIds: new Set(has) }),
          );
          const wanted = ids.filter((id) => {
            const isReference = id.startsWith("ref");
            const moves = events.flatMap((each, at) =>
              each.event === "moved" && (isReference || each.stationIds.includes(id)) ? [at] : [],
            );
            const last = moves.at(-1) ?? -1;
            const didMove = last >= 0 || planned.includes(id) || (isReference && planned.length > 0);
            const seen = events.some(
              (each, at) => at > last && each.event === "measured" && each.stationIds.includes(id),
            );
            return didMove && (!has.includes(id) || (last >= 0 && !seen));
          });
          expect([...got].sort()).toEqual([...wanted].sort());
          const places = got.map((id) => (id === "ref-2" ? 0 : id === "ref-1" ? 1 : 2 + ids.indexOf(id)));
          expect(places).toEqual([...places].sort((one, other) => one - other));
        },
      ),
    );
  });
});
