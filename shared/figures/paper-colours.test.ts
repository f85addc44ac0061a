import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { paperColours, whitePaperColours } from "./paper-colours.ts";

const tokens = readFileSync(new URL("../../console/src/styles/tokens.css", import.meta.url), "utf8");
const lightOf = (name: string): string =>
  new RegExp(`--color-${name}: light-dark\\((#[0-9a-f]{6}),`).exec(tokens)?.[1] ?? "";
const channels = (colour: string): number[] =>
  [1, 3, 5].map((from) => Number.parseInt(colour.slice(from, from + 2), 16));

describe("the colours on paper", () => {
  it.each([
    ["ink", "ink"],
    ["muted", "muted"],
    ["faint", "hair"],
    ["signal", "signal"],
    ["paper", "sheet"],
  ] as const)("are the console's light ones: %s", (tone, token) => {
    expect(paperColours[tone]).toBe(lightOf(token));
  });

  it.each([paperColours, whitePaperColours])(
    "shade as the console does: 14 parts of muted in 100",
    (colours) => {
      const [muted, paper, shade] = [colours.muted, colours.paper, colours.shade].map(channels);
      shade?.forEach((channel, index) => {
        const mixed = (muted?.[index] ?? NaN) * 0.14 + (paper?.[index] ?? NaN) * 0.86;
        expect(Math.abs(channel - mixed)).toBeLessThanOrEqual(0.51);
      });
    },
  );
});
