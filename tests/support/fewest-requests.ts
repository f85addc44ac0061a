import type { FewestMovesRequest } from "../../shared/schemas/fewest-moves.ts";

/** Two rings and a casing between two bearings, in millimetres: all low, the casing most. */
export const fewestRequest: FewestMovesRequest = {
  units: { axial: "mm", bore: "mm", offset: "mm" },
  stations: [
    { id: "brg-1", z: 0, deviation: { h: 0, v: 0 }, tolerance: { h: 0.08, v: 0.08 } },
    {
      id: "cas-1",
      z: 1000,
      deviation: { h: 0.02, v: -0.41 },
      covariance: [
        [0.0001, 0],
        [0, 0.0001],
      ],
      dof: 40,
      tolerance: { radial: 0.1 },
    },
    { id: "cas-2", z: 2000, deviation: { h: -0.03, v: -0.36 }, tolerance: { radial: 0.1 } },
    { id: "ring-1", z: 3000, deviation: { h: 0.01, v: -0.14 }, tolerance: { radial: 0.12 } },
    { id: "ring-2", z: 3400, deviation: { h: 0, v: -0.15 }, tolerance: { radial: 0.12 } },
    { id: "brg-2", z: 5000, deviation: { h: 0, v: 0 }, tolerance: { h: 0.08, v: 0.08 } },
  ],
  reference: [
    { id: "brg-1", float: { v: [-0.05, 0.05] } },
    { id: "brg-2", float: { v: [-0.05, 0.05] } },
  ],
  components: [
    {
      id: "casing",
      kind: "casing",
      cost: 3,
      stations: ["cas-1", "cas-2"],
      supports: [
        { id: "fore", z: 900, form: "feet", travel: { h: [-0.5, 0.5], v: [-0.2, 0.8] } },
        {
          id: "aft",
          z: 2100,
          form: "feet",
          travel: { h: [-0.5, 0.5], v: [-0.2, 0.8] },
          stacks: { left: { thickness: 6, min: 2, max: 9 }, right: { thickness: 6, min: 2, max: 9 } },
        },
      ],
    },
    {
      id: "ring-a",
      kind: "shroud",
      stations: ["ring-1"],
      supports: [{ id: "keys", z: 3000, form: "joint_keys" }],
    },
    {
      id: "ring-b",
      kind: "shroud",
      stations: ["ring-2"],
      supports: [{ id: "keys", z: 3400, form: "joint_keys" }],
    },
    { id: "bearing-1", kind: "bearing", stations: ["brg-1"], fixed: true },
  ],
  margin: 0.01,
};
