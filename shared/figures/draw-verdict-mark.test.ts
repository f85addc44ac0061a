import { describe, expect, it } from "vitest";
import { drawVerdictMark } from "./draw-verdict-mark.ts";

const at = { x: 10, y: 10 };

describe("the mark of a verdict", () => {
  it("conforms as an open ring", () => {
    expect(drawVerdictMark("conforms", at, 1)).toEqual([
      { kind: "circle", pen: "wide", centre: at, radius: 1, fill: "paper" },
    ]);
  });

  it("is a ring with its lower half filled while undecided", () => {
    const [ring, half] = drawVerdictMark("undecided", at, 1);
    expect(ring).toMatchObject({ kind: "circle", fill: "paper" });
    expect(half?.kind === "path" && half.points.every(({ y }) => y >= at.y - 1e-12)).toBe(true);
  });

  it("exceeds as a filled lozenge", () => {
    const [lozenge] = drawVerdictMark("exceeds", at, 1);
    expect(lozenge).toMatchObject({ kind: "path", closed: true, fill: "signal" });
    expect(lozenge?.kind === "path" && lozenge.points).toHaveLength(4);
  });

  it("is a dot where nothing was judged", () => {
    expect(drawVerdictMark(null, at, 1)).toMatchObject([{ kind: "circle", pen: null, fill: "ink" }]);
  });

  it("keeps the signal tone for what a person must look at now", () => {
    const tones = (replaced: boolean) =>
      JSON.stringify(drawVerdictMark("exceeds", at, 1, replaced)).includes("signal");
    expect(tones(false)).toBe(true);
    expect(tones(true)).toBe(false);
  });
});
