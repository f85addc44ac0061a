// Deviations from the reference axis: npx tsx examples/typescript/axis-deviations.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface AxisDeviations {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly result: {
    readonly stations: readonly {
      readonly id: string;
      readonly deviation: { readonly h: number; readonly v: number; readonly radial: number };
      readonly verdict: string | null;
    }[];
  };
}

const { id, units, result } = await postCalculation<AxisDeviations>(
  "/v1/axis-deviations",
  readRequest("axis-deviations/least-squares-as-found"),
);
console.log(`Record ${id}`);
for (const { id: station, deviation, verdict } of result.stations) {
  const [h, v, radial] = [deviation.h, deviation.v, deviation.radial].map(
    (value) => `${value.toFixed(4)} ${units.offset}`,
  );
  console.log(`${station}: deviation h ${h}, v ${v}, radial ${radial}; ${verdict ?? "no tolerance"}`);
}
