/** The way the reader looked. Readings taken looking upstream are mirrored on entry: h changes sign. */
export type Seen = "downstream" | "upstream";

/** What every form of reading has beside its readings. A missing datum is null. */
interface Common {
  readonly seen: Seen;
  /** Coverage probability of the expanded uncertainty, in (0, 1). */
  readonly level: number;
  /** Standard uncertainty of a reading that states none of its own. */
  readonly readingUncertaintyMm: number | null;
  /** Only compared with the diameter found; null where the reader gave none. */
  readonly nominalDiameterMm: number | null;
}

/** A point on the wall, from any origin of the cross-section. */
export interface WallPoint {
  readonly hMm: number;
  readonly vMm: number;
  /** From the station's plane, positive downstream. For all points of a bore or for none. */
  readonly zMm: number | null;
  readonly uMm: number | null;
}

/** The cone's half angle: radius R + z·tan α, positive opening downstream. */
export type Taper = { readonly form: "known"; readonly halfAngleDeg: number } | { readonly form: "estimate" };

/** Exclude, one by one, the reading whose |r|/u passes threshold × 1.4826 × the median. */
export interface OutlierRule {
  readonly threshold: number;
}

export interface PointsInput extends Common {
  readonly form: "points";
  readonly points: readonly WallPoint[];
  readonly taper: Taper | null;
  readonly outliers: OutlierRule | null;
}

export interface GaugeReading {
  /** Clockwise from 12 o'clock in the view of `seen`. */
  readonly clockDeg: number;
  /** As read from the indicator, not halved. */
  readonly readingMm: number;
  readonly uMm: number | null;
}

/** A gauge turned about its own axis, which need not be the bore's. */
export interface TurnedGaugeInput extends Common {
  readonly form: "turned_gauge";
  readonly nominalDiameterMm: number;
  /** Whether a larger reading means that the wall is farther from the gauge's axis, or nearer. */
  readonly sense: "larger_is_farther" | "larger_is_nearer";
  /** Whether the gauge reads 0 at the nominal radius, or anywhere: then the diameter is not known. */
  readonly zero: "nominal" | "arbitrary";
  /** How far the tip hangs below the axis it is turned about, positive down. */
  readonly gaugeSagMm: number;
  readonly readings: readonly GaugeReading[];
  readonly outliers: OutlierRule | null;
}

/** The beam's spot in the frame of a target turned with its bracket. */
export interface TargetSpot {
  readonly clockDeg: number;
  readonly hMm: number;
  readonly vMm: number;
  /** Standard uncertainty of each of the two coordinates. */
  readonly uMm: number | null;
}

/** A position-sensing target turned about the bore's own centre. */
export interface RotatingTargetInput extends Common {
  readonly form: "rotating_target";
  /** Whether the reading is the spot's place on the target, or the target's place from the spot. */
  readonly sense: "spot_on_target" | "target_from_spot";
  readonly spots: readonly TargetSpot[];
}

/** Inside readings from a stretched wire to the wall. */
export interface WireInput extends Common {
  readonly form: "wire";
  readonly leftMm: number;
  readonly rightMm: number;
  readonly bottomMm: number;
  /** Null where the upper half is off. */
  readonly topMm: number | null;
  /** How far the wire hangs below its straight chord at this z. */
  readonly sagMm: number;
  /** Diameter of the wire where its surface was touched; null where readings are to its centre. */
  readonly touchedWireDiameterMm: number | null;
}

export type WallInput = PointsInput | TurnedGaugeInput | WireInput;
export type BoreInput = WallInput | RotatingTargetInput;
