// How to move the source of a line of sight: npx tsx examples/typescript/sight-line-setups.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface Pair {
  readonly h: number;
  readonly v: number;
}

interface SightLineSetup {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly cautions: readonly { readonly text: string }[];
  readonly result: {
    readonly stations: readonly { readonly id: string; readonly off: Pair; readonly within: boolean }[];
    readonly adjustment: {
      readonly shift: Pair;
      readonly tiltMilliradians: Pair;
      readonly moves: readonly ({ readonly at: string } & Pair)[] | null;
    } | null;
    readonly next: string;
    readonly warnings: readonly { readonly code: string; readonly detail: string }[];
  };
}

const { id, units, cautions, result } = await postCalculation<SightLineSetup>(
  "/v1/sight-line-setups",
  readRequest("sight-line-setups/laser-upstream-with-drift"),
);
const vector = ({ h, v }: Pair) => `h ${h.toFixed(4)} ${units.offset}, v ${v.toFixed(4)} ${units.offset}`;
console.log(`Record ${id}`);
for (const { text } of cautions) console.log(`Caution: ${text}`);
for (const { id: station, off, within } of result.stations) {
  console.log(`${station}: beam off ${vector(off)}; ${within ? "within" : "not within"}`);
}
if (result.adjustment) {
  const { shift, tiltMilliradians: tilt, moves } = result.adjustment;
  console.log(`Source: shift ${vector(shift)}`);
  console.log(`Source: tilt h ${tilt.h.toFixed(4)} mrad, v ${tilt.v.toFixed(4)} mrad`);
  for (const move of moves ?? []) console.log(`  ${move.at}: move ${vector(move)}`);
}
console.log(`Next: ${result.next}`);
for (const { code, detail } of result.warnings) console.log(`  ${code}: ${detail}`);
