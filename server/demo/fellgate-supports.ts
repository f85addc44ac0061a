import type { ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";

type Component = ShimMoveRequest["components"][number];

/** A ring in its casing's groove: two keys at the horizontal joint carry it, one at the bottom holds it sideways. */
function ring(id: string, kind: "shroud" | "nozzle", station: string, z: number): Component {
  return {
    id,
    kind,
    stations: [station],
    supports: [
      {
        id: `${station}-keys`,
        z,
        form: "joint_keys",
        travel: { h: [-0.5, 0.5], v: [-0.5, 0.5] },
        stacks: {
          "key-left": { thickness: 6, min: 4, max: 8 },
          "key-right": { thickness: 6, min: 4, max: 8 },
          "key-bottom": { thickness: 10, min: 8, max: 12 },
        },
      },
    ],
  };
}

/** A bearing on two lower pads, held down by one at the top. */
function padBearing(id: string, station: string, z: number): Component {
  const stack = { thickness: 3, min: 1, max: 5, maxCount: 4 };
  return {
    id,
    kind: "bearing",
    stations: [station],
    supports: [
      {
        id: `${station}-seat`,
        z,
        form: "pads",
        pads: [
          { id: "lower-right", clockDeg: 135, stack },
          { id: "lower-left", clockDeg: 225, stack },
          { id: "top", clockDeg: 0, stack },
        ],
      },
    ],
  };
}

const foot = { thickness: 8, min: 2, max: 14, maxCount: 6 };
const sideKey = { thickness: 5, min: 3, max: 7 };

/** What of the machine can be moved, and on what it stands. The exhaust's sides are set by jack: it has no side keys. */
export const fellgateComponents: Component[] = [
  {
    id: "compressor-casing",
    kind: "casing",
    stations: ["cas-1", "cas-2", "cas-3", "cas-4", "cas-5", "dif-1"],
    supports: [
      {
        id: "feet-forward",
        z: 760,
        form: "feet",
        travel: { h: [-0.6, 0.6], v: [-0.4, 1] },
        keys: "outside",
        stacks: { left: foot, right: foot, "key-left": sideKey, "key-right": sideKey },
      },
      {
        id: "feet-aft",
        z: 3560,
        form: "feet",
        travel: { h: [-0.6, 0.6], v: [-0.4, 1] },
        keys: "outside",
        stacks: { left: foot, right: foot, "key-left": sideKey, "key-right": sideKey },
      },
    ],
  },
  ring("nozzle-1", "nozzle", "noz-1", 4420),
  ring("shroud-1", "shroud", "shr-1", 4650),
  ring("nozzle-2", "nozzle", "noz-2", 4920),
  ring("shroud-2", "shroud", "shr-2", 5150),
  ring("shroud-3", "shroud", "shr-3", 5680),
  {
    id: "exhaust-casing",
    kind: "casing",
    stations: ["exh-1"],
    supports: [
      {
        id: "exhaust-feet",
        z: 6240,
        form: "feet",
        travel: { h: [-0.3, 0.3], v: [-0.3, 0.6] },
        keys: "outside",
        stacks: { left: foot, right: foot },
      },
    ],
  },
  padBearing("bearing-1", "brg-1", 0),
  padBearing("bearing-2", "brg-2", 6900),
];

export const fellgateIndicators: NonNullable<ShimMoveRequest["indicators"]> = [
  { id: "compressor-forward-top", component: "compressor-casing", z: 760, clockDeg: 0, contact: "outside" },
  { id: "compressor-aft-top", component: "compressor-casing", z: 3560, clockDeg: 0, contact: "outside" },
  { id: "compressor-aft-right", component: "compressor-casing", z: 3560, clockDeg: 90, contact: "outside" },
  { id: "exhaust-top", component: "exhaust-casing", z: 6240, clockDeg: 0, contact: "outside" },
  { id: "bearing-2-bottom", component: "bearing-2", z: 6900, clockDeg: 180, contact: "inside" },
];
