import type { MachineDocument } from "../../shared/schemas/machines.ts";
import { fellgateStations, referenceStations, units } from "./fellgate-machine.ts";
import { fellgateComponents, fellgateIndicators } from "./fellgate-supports.ts";

const kinds: readonly (readonly [prefix: string, kind: MachineDocument["stations"][number]["kind"]])[] = [
  ["brg", "bearing"],
  ["cas", "casing"],
  ["dif", "casing"],
  ["noz", "nozzle"],
  ["shr", "shroud"],
];

/** The demo's machine, as its owner would describe it to the service. */
export const fellgateDocument: MachineDocument = {
  name: "Fellgate Unit 2",
  plantTag: "FG-2-GT",
  owner: "Fellgate Works (demo)",
  downstream: "Toward the generator.",
  units,
  stations: fellgateStations.map(({ id, z, nominalDiameter, target, targetUncertainty, tolerance }) => ({
    id,
    kind: kinds.find(([prefix]) => id.startsWith(prefix))?.[1] ?? "other",
    z,
    nominalDiameter,
    target,
    targetUncertainty,
    tolerance,
  })),
  reference: [...referenceStations],
  components: fellgateComponents,
  indicators: fellgateIndicators,
  shims: { cutToSize: { increment: 0.01 } },
  maximumIncrement: 0.25,
  maximumMisfit: 0.02,
  cautions: [
    "Lift the rotor and the upper halves with the maker's gear alone; nobody stands under them.",
    "Do not loosen the anchor bolts of the exhaust before its struts carry it.",
    "Tighten the horizontal joint to the maker's torque, in the maker's order, before any survey.",
  ],
  remarks: "An invented machine of an invented works.",
};
