// What moved between two surveys: npx tsx examples/typescript/confirmations.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface Vector {
  readonly h: number;
  readonly v: number;
}

interface Confirmation {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly cautions: readonly { readonly text: string }[];
  readonly result: {
    readonly reference: { readonly repeats: boolean | null };
    readonly moved: readonly {
      readonly id: string;
      readonly planned: Vector | null;
      readonly achieved: Vector | null;
    }[];
    readonly unexpected: readonly string[];
    readonly outstanding: readonly string[];
    readonly warnings: readonly { readonly code: string; readonly detail: string }[];
  };
}

const { id, units, cautions, result } = await postCalculation<Confirmation>(
  "/v1/confirmations",
  readRequest("confirmations/casing-moved-same-set-up"),
);
const length = (value: number) => `${value.toFixed(4)} ${units.offset}`;
const vector = ({ h, v }: Vector) => `h ${length(h)}, v ${length(v)}`;
const { repeats } = result.reference;
console.log(`Record ${id}`);
for (const { text } of cautions) console.log(`Caution: ${text}`);
console.log(
  `Reference stations ${repeats === null ? "are not shown to repeat" : repeats ? "repeat" : "do not repeat"}`,
);
for (const { id: station, planned, achieved } of result.moved)
  console.log(
    `${station}: planned ${planned ? vector(planned) : "nothing"}; achieved ${achieved ? vector(achieved) : "not known"}`,
  );
console.log(`Unexpected: ${result.unexpected.join(", ") || "none"}`);
console.log(`Outstanding: ${result.outstanding.join(", ") || "none"}`);
for (const { code, detail } of result.warnings) console.log(`  ${code}: ${detail}`);
