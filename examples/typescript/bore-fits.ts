// Bore centres from wall readings: npx tsx examples/typescript/bore-fits.ts [request.json]
import { postCalculation, readRequest } from "./client.ts";

interface BoreFits {
  readonly id: string;
  readonly units: { readonly bore: string; readonly offset: string };
  readonly result: {
    readonly bores: readonly {
      readonly id: string;
      readonly centre: { readonly h: number; readonly v: number };
      readonly diameter: number | null;
      readonly warnings: readonly { readonly code: string; readonly detail: string }[];
    }[];
  };
}

const { id, units, result } = await postCalculation<BoreFits>(
  "/v1/bore-fits",
  readRequest("bore-fits/points-with-uncertainty"),
);
console.log(`Record ${id}`);
for (const { id: bore, centre, diameter, warnings } of result.bores) {
  const size = diameter === null ? "not known" : `${diameter.toFixed(3)} ${units.bore}`;
  const place = `h ${centre.h.toFixed(4)} ${units.offset}, v ${centre.v.toFixed(4)} ${units.offset}`;
  console.log(`${bore}: centre ${place}; diameter ${size}`);
  for (const { code, detail } of warnings) console.log(`  ${code}: ${detail}`);
}
