import type { BoreFitRequest, BoreRequest } from "../../shared/schemas/bore-fits.ts";
import type { Units } from "../../shared/units.ts";

const mm: Units = { axial: "mm", bore: "mm", offset: "mm" };
const radians = (deg: number) => (deg * Math.PI) / 180;
const around = (count: number) => Array.from({ length: count }, (_, i) => (i * 360) / count);
const wave = (i: number) => 0.02 * Math.cos(5 * i);

function wallPoints(count: number, radius: number, zOf: (i: number) => number | null) {
  return around(count).map((deg, i) => {
    const z = zOf(i);
    const at = radius + wave(i) + 0.1 * (z ?? 0);
    const point = { h: 0.3 + at * Math.sin(radians(deg)), v: -0.4 + at * Math.cos(radians(deg)) };
    return z === null ? point : { ...point, z };
  });
}

export type Of<Form extends BoreRequest["form"]> = Extract<BoreRequest, { form: Form }>;

export const pointsBore: Of<"points"> = {
  id: "brg-1",
  form: "points",
  nominalDiameter: 360,
  readingUncertainty: 0.02,
  points: wallPoints(12, 180, () => null),
  outliers: { rule: "mad" },
};

export const taperBore: Of<"points"> = {
  id: "dif-1",
  form: "points",
  readingUncertainty: 0.02,
  points: wallPoints(14, 650, (i) => (i % 2 ? 60 : -60)).map((point, i) => ({
    ...point,
    u: 0.01 + 0.001 * i,
  })),
  taper: { estimate: true },
};

/** Two planes 90 mm apart, the second 0.18 mm to the right. */
export const tiltBore: Of<"points"> = {
  id: "cas-1",
  form: "points",
  points: wallPoints(14, 740, () => null).map(({ h, v }, i) => ({
    h: h + (i % 2) * 0.18,
    v,
    z: (i % 2) * 90,
  })),
};

export const gaugeBore: Of<"turned_gauge"> = {
  id: "cas-2",
  form: "turned_gauge",
  nominalDiameter: 1440,
  sense: "larger_is_nearer",
  zero: "nominal",
  gaugeSag: 0.03,
  readingUncertainty: 0.02,
  readings: around(9).map((clockDeg, i) => ({
    clockDeg,
    reading: 0.2 * Math.cos(radians(clockDeg - 70)) + wave(i),
    u: 0.01,
  })),
};

export const targetBore: Of<"rotating_target"> = {
  id: "shr-1",
  form: "rotating_target",
  seen: "upstream",
  sense: "target_from_spot",
  spots: around(5).map((clockDeg, i) => ({
    clockDeg,
    h: 0.1 + 0.3 * Math.cos(radians(clockDeg)) + wave(i),
    v: -0.2 + 0.3 * Math.sin(radians(clockDeg)) - wave(i),
    u: 0.03,
  })),
};

export const wireBore: Of<"wire"> = {
  id: "brg-2",
  form: "wire",
  nominalDiameter: 400,
  readingUncertainty: 0.01,
  wire: {
    left: 199.7,
    right: 199.8,
    bottom: 200.1,
    top: 199.4,
    sag: 0.11,
    wireDiameter: 0.5,
    measuredTo: "surface",
  },
};

/** A bore of every form in millimetres, one of them read from the other end. */
export const everyFormMm: BoreFitRequest = {
  units: mm,
  seen: "downstream",
  level: 0.95,
  bores: [pointsBore, taperBore, tiltBore, gaugeBore, targetBore, wireBore],
};

export const badWire: Of<"wire">["wire"] = { ...wireBore.wire, wireDiameter: null };
/** Bores that pass the schema and cannot be computed, but for the id of the second. */
export const faultyBores: readonly BoreRequest[] = [
  { ...pointsBore, points: pointsBore.points.slice(0, 2) },
  pointsBore,
  {
    ...taperBore,
    method: "minimum_zone",
    points: taperBore.points.map((point, i) => (i === 3 ? { ...point, z: null } : point)),
  },
  {
    ...gaugeBore,
    readings: gaugeBore.readings.map((one, i) => (i === 2 || i === 5 ? { ...one, reading: 720 } : one)),
  },
  { ...targetBore, spots: targetBore.spots.map((spot) => ({ ...spot, clockDeg: 30 })) },
  { ...wireBore, method: "ellipse", wire: badWire },
];
/** Their faults, each at its place. */
export const faultsOfThose = [
  "/bores/0/points too_few_points",
  "/bores/1/id duplicate_id",
  "/bores/2/points combination_invalid",
  "/bores/2/taper combination_invalid",
  "/bores/3/readings/2/reading radius_not_positive",
  "/bores/3/readings/5/reading radius_not_positive",
  "/bores/4/spots angles_insufficient",
  "/bores/5/method combination_invalid",
  "/bores/5/wire/wireDiameter required",
];
