// The parts to move, and the axis that needs the fewest of them: npx tsx examples/typescript/fewest-moves.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface FewestMoves {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly cautions: readonly { readonly text: string }[];
  readonly result: {
    readonly cost: number | null;
    readonly infeasible: { readonly reason: string } | null;
    readonly axis: {
      readonly float: readonly { readonly id: string; readonly h: number; readonly v: number }[];
    };
    readonly components: readonly {
      readonly id: string;
      readonly moved: boolean;
      readonly moves: readonly { readonly support: string; readonly h: number; readonly v: number }[];
    }[];
    readonly advice: readonly { readonly code: string; readonly detail: string }[];
  };
}

const { id, units, cautions, result } = await postCalculation<FewestMoves>(
  "/v1/fewest-moves",
  readRequest("fewest-moves/casing-and-shroud-low"),
);
const length = (value: number) => `${value.toFixed(4)} ${units.offset}`;
console.log(`Record ${id}`);
for (const { text } of cautions) console.log(`Caution: ${text}`);
console.log(result.infeasible ? `No choice: ${result.infeasible.reason}` : `Cost ${result.cost}`);
for (const at of result.axis.float) console.log(`axis at ${at.id}: h ${length(at.h)}, v ${length(at.v)}`);
for (const { id: component, moved, moves } of result.components) {
  if (!moved) continue;
  for (const { support, h, v } of moves)
    console.log(`${component} at ${support}: move h ${length(h)}, v ${length(v)}`);
}
for (const { code, detail } of result.advice) console.log(`  ${code}: ${detail}`);
