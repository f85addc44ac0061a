import type { AlignmentRequest } from "../../shared/schemas/alignments.ts";
import { seededRandom } from "../support/seeded-random.ts";

type Component = NonNullable<AlignmentRequest["components"]>[number];
type Station = AlignmentRequest["stations"][number];
type Bore = AlignmentRequest["bores"][number];

const foot = { thickness: 8, min: 2, max: 14, maxCount: 6 };
const key = { thickness: 6, min: 3, max: 9 };

/** A typical machine: 20 stations of 24 readings, 8 components, 30 stacks; shims cut to 0.05 mm. */
export function typicalMachine(seed = 7): AlignmentRequest {
  const random = seededRandom(seed);
  const off = (by: number) => by * (2 * random.uniform() - 1);
  const ids = Array.from({ length: 20 }, (_, k) => `s${k}`);
  const stations: Station[] = ids.map((id, k) => ({
    id,
    z: 400 * k,
    target: { h: 0, v: -0.1 },
    targetUncertainty: { h: 0.005, v: 0.01 },
    tolerance: { radial: 0.15 },
  }));
  const bores: Bore[] = ids.map((id) => {
    const [h, v] = [off(0.2), -0.1 + off(0.3)];
    return {
      id: `${id} gauge`,
      station: id,
      form: "turned_gauge",
      nominalDiameter: 1200,
      sense: "larger_is_farther",
      zero: "nominal",
      readingUncertainty: 0.005,
      readings: Array.from({ length: 24 }, (_, i) => {
        const radians = (i * Math.PI) / 12;
        return {
          clockDeg: 15 * i,
          reading: h * Math.sin(radians) + v * Math.cos(radians) + 0.005 * random.normal(),
        };
      }),
    };
  });
  return {
    units: { axial: "mm", bore: "mm", offset: "mm" },
    seen: "downstream",
    level: 0.95,
    bores,
    stations,
    axis: { method: "two_station", through: ["s0", "s19"] },
    components: [casing("casing-1", ids.slice(1, 8)), casing("casing-2", ids.slice(8, 13)), ...rings(ids)],
    shims: { cutToSize: { increment: 0.05 } },
    maximumIncrement: 0.25,
  };
}

/** Two pairs of feet with side keys under the first support: 6 stacks. */
function casing(id: string, stations: readonly string[]): Component {
  const z = stations.map((station) => 400 * Number(station.slice(1)));
  return {
    id,
    kind: "casing",
    stations: [...stations],
    supports: [
      {
        id: "forward",
        z: Math.min(...z),
        form: "feet",
        stacks: { left: foot, right: foot, "key-left": key, "key-right": key },
      },
      { id: "aft", z: Math.max(...z), form: "feet", stacks: { left: foot, right: foot } },
    ],
  };
}

/** Six rings on three keys each: 18 stacks. */
function rings(ids: readonly string[]): Component[] {
  return ids.slice(13, 19).map((station) => ({
    id: `ring-${station}`,
    kind: "shroud",
    stations: [station],
    supports: [
      {
        id: "keys",
        z: 400 * Number(station.slice(1)),
        form: "joint_keys",
        stacks: { "key-left": key, "key-right": key, "key-bottom": key },
      },
    ],
  }));
}
