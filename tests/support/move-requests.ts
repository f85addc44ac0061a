import type { ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";

type Component = ShimMoveRequest["components"][number];

/** A bearing on two lower pads at 135 and 225 degrees and one at the top. */
export const padBearing: Component = {
  id: "bearing",
  kind: "bearing",
  stations: ["brg"],
  supports: [
    {
      id: "seat",
      z: 0,
      form: "pads",
      pads: [
        { id: "right", clockDeg: 135, stack: { thickness: 3, shims: [2, 1], min: 1, max: 5 } },
        { id: "left", clockDeg: 225, stack: { thickness: 3, min: 1, max: 5 } },
        { id: "top", clockDeg: 0, stack: { thickness: 3 } },
      ],
    },
  ],
};

/** A casing on two pairs of feet, the forward pair with side keys. */
export const casing: Component = {
  id: "casing",
  kind: "casing",
  stations: ["fore", "aft"],
  supports: [
    {
      id: "forward",
      z: 1000,
      form: "feet",
      travel: { h: [-0.5, 0.5], v: [-0.5, 0.5] },
      stacks: {
        left: { thickness: 8 },
        right: { thickness: 8 },
        "key-left": { thickness: 5 },
        "key-right": { thickness: 5 },
      },
    },
    { id: "rear", z: 2000, form: "feet", stacks: { left: { thickness: 8 }, right: { thickness: 8 } } },
  ],
};

/** Two components, three stations, in millimetres: asks the casing for (0.1, 0.2) and (-0.1, 0.3), the bearing for v 0.1. */
export const moveRequest: ShimMoveRequest = {
  units: { axial: "mm", bore: "mm", offset: "mm" },
  level: 0.95,
  stations: [
    { id: "brg", z: 0, deviation: { h: 0, v: -0.1 }, tolerance: { radial: 0.05 } },
    { id: "fore", z: 1000, deviation: { h: -0.1, v: -0.2 }, tolerance: { radial: 0.1 } },
    { id: "aft", z: 2000, deviation: { h: 0.1, v: -0.3 }, tolerance: { radial: 0.1 } },
  ],
  components: [padBearing, casing],
  maximumIncrement: 0.15,
  indicators: [{ id: "dial", component: "casing", z: 2000, clockDeg: 0, contact: "outside" }],
};
