// How readings repeat: npx tsx examples/typescript/repeatability-studies.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface Vector {
  readonly h: number;
  readonly v: number;
}

interface Warned {
  readonly warnings: readonly { readonly code: string; readonly detail: string }[];
}

interface OneStation extends Warned {
  readonly form: "one_station";
  readonly station: string;
  readonly mean: Vector;
  readonly standardDeviation: Vector;
  readonly uncertainty: Vector;
}

interface Crossed extends Warned {
  readonly form: "crossed";
  readonly components: Readonly<Record<string, Vector>>;
}

interface RepeatabilityStudy {
  readonly id: string;
  readonly units: { readonly offset: string };
  readonly result: OneStation | Crossed;
}

const { id, units, result } = await postCalculation<RepeatabilityStudy>(
  "/v1/repeatability-studies",
  readRequest("repeatability-studies/one-station-with-drift"),
);
const length = (value: number) => `${value.toFixed(4)} ${units.offset}`;
const vector = ({ h, v }: Vector) => `h ${length(h)}, v ${length(v)}`;
console.log(`Record ${id}`);
if (result.form === "one_station") {
  console.log(`${result.station}: mean ${vector(result.mean)}`);
  console.log(`standard deviation ${vector(result.standardDeviation)}`);
  console.log(`uncertainty of the mean ${vector(result.uncertainty)}`);
} else {
  for (const [source, component] of Object.entries(result.components))
    console.log(`${source}: standard deviation ${vector(component)}`);
}
for (const { code, detail } of result.warnings) console.log(`  ${code}: ${detail}`);
