import type { LengthUnit } from "../../units.ts";
import type { Verdict } from "../draw-verdict-mark.ts";

/** Where a bore was found, or left, at an outage: off that outage's own axis, in the offset unit. */
export interface HistoryPlace {
  /** Index into the model's outages. */
  readonly outage: number;
  readonly moment: "found" | "left";
  readonly h: number;
  readonly v: number;
  readonly verdict: Verdict | null;
}

/** What became of a bore between two outages. */
export interface HistoryDrift {
  readonly from: number;
  readonly to: number;
  /** Null where it cannot be tested. */
  readonly changed: boolean | null;
}

export interface HistoryStation {
  readonly id: string;
  /** It set the axis in one of the outages: its own drift is hidden in the axis. */
  readonly reference: boolean;
  readonly places: readonly HistoryPlace[];
  readonly drifts: readonly HistoryDrift[];
}

export interface HistoryModel {
  readonly offsetUnit: LengthUnit;
  /** Oldest first. */
  readonly outages: readonly { readonly title: string; readonly day: string }[];
  readonly stations: readonly HistoryStation[];
}
