import { afterAll, beforeAll, expect } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { describeCases, mismatches } from "./read-cases.ts";

/** The published choices of pieces from stock through the whole service: JSON in, a stored record, JSON out. */
let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  key = (await (await makeOrganisation(app.deps)).key("calculations:write")).secret;
});
afterAll(() => app.close());

interface StockChoice {
  readonly target?: number;
  readonly targets?: readonly number[];
  readonly stock: readonly number[];
  readonly each_available: number;
  readonly max_pieces: number;
}

/** A bearing on one pad below it, on an empty stack, lifted by the target; the case's unit is sent as the offset unit. */
async function reach(target: number, input: StockChoice): Promise<number[]> {
  const body = {
    units: { axial: "mm", bore: "mm", offset: "mm" },
    stations: [{ id: "bore", z: 0, deviation: { h: 0, v: -target / 1000 }, tolerance: { radial: 0.01 } }],
    components: [
      {
        id: "bearing",
        kind: "bearing",
        stations: ["bore"],
        supports: [
          {
            id: "seat",
            z: 0,
            form: "pads",
            pads: [
              { id: "pad", clockDeg: 180, stack: { thickness: 0, shims: [], maxCount: input.max_pieces } },
            ],
          },
        ],
      },
    ],
    shims: {
      stock: input.stock.map((units) => ({ thickness: units / 1000, quantity: input.each_available })),
    },
  };
  const answer = await app.call().post("/v1/shim-moves").set("Authorization", `Bearer ${key}`).send(body);
  expect(answer.status, answer.text).toBe(201);
  const { result } = answer.body as { result: { components: { stacks: { add: number[] }[] }[] } };
  return result.components[0]!.stacks[0]!.add.map((mm) => Math.round(mm * 1000));
}

const sum = (values: readonly number[]) => values.reduce((total, value) => total + value, 0);

describeCases<StockChoice, object>(
  "POST /v1/shim-moves: integer-stock-choice",
  ["integer-stock-choice"],
  async (reference) => {
    const { target, targets = [target ?? 0] } = reference.input;
    const chosen: number[][] = [];
    for (const one of targets) chosen.push(await reach(one, reference.input));
    const pieces = chosen.map(({ length }) => length);
    for (const [k, one] of chosen.entries()) expect(sum(one)).toBe(targets[k]);
    const got =
      target === undefined ? { pieces } : { error: Math.abs(sum(chosen[0]!) - target), pieces: pieces[0] };
    const checked = { ...reference, expected: { ...reference.expected, published_selection: undefined } };
    expect(mismatches(checked, got).filter(({ field }) => field !== "published_selection")).toEqual([]);
  },
);
