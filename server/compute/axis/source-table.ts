import type { ErrorSource } from "./error-source.ts";

/** Error sources by column, mm²: what the loops over every station and every reference station read. */
export interface SourceTable {
  readonly measuredHH: Float64Array;
  readonly measuredHV: Float64Array;
  readonly measuredVV: Float64Array;
  readonly targetH: Float64Array;
  readonly targetV: Float64Array;
  readonly isScatter: Uint8Array;
  /** Infinity where `measured` is known. Two more places after the sources: the scatter that many share, and the targets. */
  readonly dof: Float64Array;
}

/** A table of the sources and one more row, empty. */
export function tabulateSources(sources: readonly ErrorSource[]): SourceTable {
  const rows = sources.length + 1;
  const column = () => new Float64Array(rows);
  const table = {
    measuredHH: column(),
    measuredHV: column(),
    measuredVV: column(),
    targetH: column(),
    targetV: column(),
    isScatter: new Uint8Array(rows),
    dof: new Float64Array(rows + 2).fill(Infinity),
  };
  sources.forEach((source, row) => writeSource(table, row, source));
  return table;
}

/** Puts one source into its row: variances in mm²; a scatter's degrees of freedom also go where all scatters share them. */
export function writeSource(table: SourceTable, row: number, source: ErrorSource): void {
  const { measured, target, isScatter } = source;
  const dof = source.dof ?? Infinity;
  table.measuredHH[row] = measured.hhMm2;
  table.measuredHV[row] = measured.hvMm2;
  table.measuredVV[row] = measured.vvMm2;
  table.targetH[row] = target.h;
  table.targetV[row] = target.v;
  table.isScatter[row] = isScatter ? 1 : 0;
  table.dof[row] = dof;
  if (isScatter) table.dof[table.isScatter.length] = dof;
}
