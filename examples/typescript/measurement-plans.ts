// Where to read a bore: npx tsx examples/typescript/measurement-plans.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface MeasurementPlan {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly result: {
    readonly bores: readonly {
      readonly id: string;
      readonly status: string;
      readonly add: readonly { readonly clockDeg: number; readonly readings: number }[];
      readonly addCount: number;
      readonly after: { readonly expandedUncertainty: { readonly radial: number } } | null;
      readonly warnings: readonly { readonly code: string; readonly detail: string }[];
    }[];
  };
}

const { id, units, result } = await postCalculation<MeasurementPlan>(
  "/v1/measurement-plans",
  readRequest("measurement-plans/lower-halves-read"),
);
console.log(`Record ${id}`);
for (const bore of result.bores) {
  const { after } = bore;
  const reached = after ? `${after.expandedUncertainty.radial.toFixed(4)} ${units.offset}` : "not known";
  console.log(`${bore.id}: ${bore.status}; add ${bore.addCount}, then U ${reached}`);
  for (const { clockDeg, readings } of bore.add) console.log(`  at ${clockDeg.toFixed(1)} deg: ${readings}`);
  for (const { code, detail } of bore.warnings) console.log(`  ${code}: ${detail}`);
}
