// Readings to moves in one call: npx tsx examples/typescript/alignments.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface Alignment {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly cautions: readonly { readonly text: string }[];
  readonly result: {
    readonly stations: readonly {
      readonly id: string;
      readonly deviation: { readonly h: number; readonly v: number };
      readonly verdict: string | null;
    }[];
    readonly moves: {
      readonly components: readonly {
        readonly id: string;
        readonly realised: readonly { readonly support: string; readonly h: number; readonly v: number }[];
      }[];
    } | null;
  };
}

const { id, units, cautions, result } = await postCalculation<Alignment>(
  "/v1/alignments",
  readRequest("alignments/gauge-readings-to-shims"),
);
const length = (value: number) => `${value.toFixed(4)} ${units.offset}`;
console.log(`Record ${id}`);
for (const { text } of cautions) console.log(`Caution: ${text}`);
for (const { id: station, deviation, verdict } of result.stations)
  console.log(
    `${station}: deviation h ${length(deviation.h)}, v ${length(deviation.v)}; ${verdict ?? "no tolerance"}`,
  );
for (const { id: component, realised } of result.moves?.components ?? [])
  for (const { support, h, v } of realised)
    console.log(`${component} at ${support}: move h ${length(h)}, v ${length(v)}`);
