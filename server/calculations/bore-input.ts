import type { BoreRequest } from "../../shared/schemas/bore-fits.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import type { BoreInput, OutlierRule, Seen, Taper } from "../compute/bore/bore-input.ts";

/** What a bore takes from its call where it states nothing itself. */
export interface CallSettings {
  readonly seen: Seen;
  readonly level: number;
}

type Converters = Record<Dimension, Converter>;
type Of<Form extends BoreRequest["form"]> = Extract<BoreRequest, { form: Form }>;

const defaultThreshold = 3.5;

/** A bore of the request in millimetres; what is absent becomes null. */
export function boreInputOf(bore: BoreRequest, call: CallSettings, convert: Converters): BoreInput {
  const optional = optionalMm(convert);
  const common = {
    seen: bore.seen ?? call.seen,
    level: call.level,
    readingUncertaintyMm: optional(bore.readingUncertainty, "offset"),
    nominalDiameterMm: optional(bore.nominalDiameter, "bore"),
  };
  switch (bore.form) {
    case "points":
      return { ...common, ...pointsOf(bore, convert) };
    case "turned_gauge":
      return { ...common, ...gaugeOf(bore, convert) };
    case "rotating_target":
      return { ...common, ...spotsOf(bore, convert) };
    case "wire":
      return { ...common, ...wireOf(bore, convert) };
  }
}

function pointsOf(bore: Of<"points">, convert: Converters) {
  const optional = optionalMm(convert);
  return {
    form: bore.form,
    points: bore.points.map(({ h, v, z, u }) => ({
      hMm: convert.bore.toMm(h),
      vMm: convert.bore.toMm(v),
      zMm: optional(z, "axial"),
      uMm: optional(u, "offset"),
    })),
    taper: taperOf(bore.taper),
    outliers: outlierRuleOf(bore.outliers),
  };
}

function gaugeOf(bore: Of<"turned_gauge">, convert: Converters) {
  const optional = optionalMm(convert);
  return {
    form: bore.form,
    nominalDiameterMm: convert.bore.toMm(bore.nominalDiameter),
    sense: bore.sense,
    zero: bore.zero,
    gaugeSagMm: optional(bore.gaugeSag, "offset") ?? 0,
    readings: bore.readings.map(({ clockDeg, reading, u }) => ({
      clockDeg,
      readingMm: convert.offset.toMm(reading),
      uMm: optional(u, "offset"),
    })),
    outliers: outlierRuleOf(bore.outliers),
  };
}

function spotsOf(bore: Of<"rotating_target">, convert: Converters) {
  const optional = optionalMm(convert);
  return {
    form: bore.form,
    sense: bore.sense,
    spots: bore.spots.map(({ clockDeg, h, v, u }) => ({
      clockDeg,
      hMm: convert.offset.toMm(h),
      vMm: convert.offset.toMm(v),
      uMm: optional(u, "offset"),
    })),
  };
}

function wireOf({ form, wire }: Of<"wire">, convert: Converters) {
  const optional = optionalMm(convert);
  return {
    form,
    leftMm: convert.bore.toMm(wire.left),
    rightMm: convert.bore.toMm(wire.right),
    bottomMm: convert.bore.toMm(wire.bottom),
    topMm: optional(wire.top, "bore"),
    sagMm: optional(wire.sag, "offset") ?? 0,
    touchedWireDiameterMm: wire.measuredTo === "surface" ? optional(wire.wireDiameter, "bore") : null,
  };
}

function optionalMm(convert: Converters) {
  return (value: number | null | undefined, dimension: Dimension): number | null =>
    value === null || value === undefined ? null : convert[dimension].toMm(value);
}

function taperOf(taper: Of<"points">["taper"]): Taper | null {
  if (!taper) return null;
  return "estimate" in taper ? { form: "estimate" } : { form: "known", halfAngleDeg: taper.halfAngleDeg };
}

function outlierRuleOf(outliers: Of<"points">["outliers"]): OutlierRule | null {
  return outliers?.rule === "mad" ? { threshold: outliers.threshold ?? defaultThreshold } : null;
}
