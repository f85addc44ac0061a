import type { ColdTargetRequest, ColdTargetResult } from "../../schemas/cold-targets.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsForSmallest } from "../significant-decimals.ts";
import { decimalsAcross, decimalsAlong, decimalsFor } from "../write-number.ts";

type Units = ColdTargetRequest["units"];

/** Each reason for growth by itself; null when no station grows. */
export function tabulateGrowths({ stations }: ColdTargetResult, units: Units): FigureTable | null {
  const growths = stations.flatMap(({ id, growths: own }) => own.map((growth) => ({ id, ...growth })));
  if (growths.length === 0) return null;
  const coefficientDecimals = decimalsForSmallest(
    growths.map(({ coefficient }) => coefficient),
    0,
  );
  const decimals = decimalsFor(
    growths.map(({ growth }) => growth),
    decimalsAcross(units.offset),
  );
  return {
    caption: "Growth, cold to hot",
    columns: [
      textColumn("station"),
      textColumn("direction"),
      numberColumn("coefficient", `per degree ${units.temperature ?? ""}`.trim()),
      numberColumn("growth", units.offset),
    ],
    rows: growths.map(({ id, direction, coefficient, growth }) => [
      textCell(id),
      textCell(direction),
      numberCell(coefficient, coefficientDecimals),
      signedCell(growth, decimals),
    ]),
  };
}

/** The running shaft at its bearings; null when the call has no rotor. */
export function tabulateRotor({ rotor }: ColdTargetResult, units: Units): FigureTable | null {
  if (!rotor) return null;
  const { supports } = rotor;
  const withForce = supports.some(({ reaction }) => reaction !== undefined);
  const decimals = decimalsFor(
    supports.flatMap(({ journal }) => [journal.h, journal.v]),
    decimalsAcross(units.offset),
  );
  const slopeDecimals = decimalsFor(
    supports.flatMap(({ slope }) => [slope.h, slope.v]),
    decimalsAcross(units.offset) + 2,
  );
  const slopeUnit = `${units.offset} per ${units.axial}`;
  return {
    caption: "Shaft at its bearings, running",
    columns: [
      numberColumn("z", units.axial),
      numberColumn("journal h", units.offset),
      numberColumn("journal v", units.offset),
      numberColumn("slope h", slopeUnit),
      numberColumn("slope v", slopeUnit),
      ...(withForce
        ? [numberColumn("reaction h", units.force ?? null), numberColumn("reaction v", units.force ?? null)]
        : []),
    ],
    rows: supports.map(({ z, journal, slope, reaction }) => [
      numberCell(z, decimalsAlong(units.axial)),
      signedCell(journal.h, decimals),
      signedCell(journal.v, decimals),
      signedCell(slope.h, slopeDecimals),
      signedCell(slope.v, slopeDecimals),
      ...(withForce ? [signedCell(reaction?.h, 0), signedCell(reaction?.v, 0)] : []),
    ]),
  };
}

/** The wire's greatest sag, exact and in the taut limit; null when the call has no wire. */
export function tabulateWire({ wire }: ColdTargetResult, units: Units): FigureTable | null {
  if (!wire) return null;
  const decimals = decimalsFor([wire.greatestSag], decimalsAcross(units.offset));
  return {
    caption: "Wire, sag at the middle of its span",
    columns: [textColumn("by"), numberColumn("sag", units.offset)],
    rows: [
      [textCell("catenary"), numberCell(wire.greatestSag, decimals)],
      [textCell("parabola"), numberCell(wire.greatestSagByParabola, decimals)],
    ],
  };
}
