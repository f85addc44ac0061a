// Shim moves from deviations: npx tsx examples/typescript/shim-moves.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface ShimMoves {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly cautions: readonly { readonly text: string }[];
  readonly result: {
    readonly components: readonly {
      readonly id: string;
      readonly realised: readonly { readonly support: string; readonly h: number; readonly v: number }[];
      readonly stacks: readonly {
        readonly support: string;
        readonly place: string;
        readonly from: number;
        readonly to: number;
        readonly change: number;
      }[];
    }[];
  };
}

const { id, units, cautions, result } = await postCalculation<ShimMoves>(
  "/v1/shim-moves",
  readRequest("shim-moves/casing-and-bearing"),
);
const length = (value: number) => `${value.toFixed(4)} ${units.offset}`;
console.log(`Record ${id}`);
for (const { text } of cautions) console.log(`Caution: ${text}`);
for (const { id: component, realised, stacks } of result.components) {
  for (const { support, h, v } of realised)
    console.log(`${component} at ${support}: move h ${length(h)}, v ${length(v)}`);
  for (const { support, place, from, to, change } of stacks)
    console.log(`  ${support} ${place}: from ${length(from)} to ${length(to)}, change ${length(change)}`);
}
