// Cold targets: npx tsx examples/typescript/cold-targets.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface Warning {
  readonly code: string;
  readonly detail: string;
}

interface ColdTargets {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly result: {
    readonly stations: readonly {
      readonly id: string;
      readonly target: { readonly h: number; readonly v: number };
      readonly warnings: readonly Warning[];
    }[];
    readonly rotor?: { readonly warnings: readonly Warning[] };
  };
}

const { id, units, result } = await postCalculation<ColdTargets>(
  "/v1/cold-targets",
  readRequest("cold-targets/rotor-sag-and-growth"),
);
console.log(`Record ${id}`);
for (const { id: station, target, warnings } of result.stations) {
  const [h, v] = [target.h, target.v].map((value) => `${value.toFixed(4)} ${units.offset}`);
  console.log(`${station}: target h ${h}, v ${v}`);
  for (const { code, detail } of warnings) console.log(`  ${code}: ${detail}`);
}
for (const { code, detail } of result.rotor?.warnings ?? []) console.log(`${code}: ${detail}`);
