import type { HalfPlanes } from "./convex-hull.ts";
import type { Region, Rivals } from "./descend-centre.ts";
import type { Optimum } from "./optimum-basin.ts";

/** A region still to be searched, with the points that can be extreme in it. */
export interface Cell extends Region, Rivals {
  /** The optimum that was found in a cell which this one is part of. */
  readonly home: Optimum | null;
  /** Near chart: no inner rival that can be innermost lies nearer to the middle. */
  readonly nearest: number;
}

/** A few rivals that are asked first: most regions are left on their word. */
const witnessesMax = 24;
/** A region longer than this × its width is cut across only. */
const longShape = 2;

/** A few of the indices, evenly along their list. */
export function spreadOver(indices: Int32Array): Int32Array {
  const stride = Math.ceil(indices.length / witnessesMax);
  return indices.filter((_, k) => k % stride === 0);
}

/** The edges that cut the cell, of those that cut what it is part of; null where the cell lies beyond one of them. */
export function cutEdges(cell: Cell, edges: HalfPlanes | null): Int32Array | null {
  if (edges === null || cell.edges.length === 0) return cell.edges;
  const { nx, ny, reach } = edges;
  const cutting = new Int32Array(cell.edges.length);
  let count = 0;
  for (const k of cell.edges) {
    const beyond = nx[k]! * cell.x + ny[k]! * cell.y - reach[k]!;
    const extent = Math.abs(nx[k]!) * cell.halfX + Math.abs(ny[k]!) * cell.halfY;
    if (beyond - extent > 0) return null;
    if (beyond + extent > 0) cutting[count++] = k;
  }
  return cutting.slice(0, count);
}

/** Quarters, or halves of a long shape. */
export function partsOf(cell: Cell): Cell[] {
  const acrossX = cell.halfX * longShape >= cell.halfY;
  const acrossY = cell.halfY * longShape >= cell.halfX;
  const halfX = acrossX ? cell.halfX / 2 : cell.halfX;
  const halfY = acrossY ? cell.halfY / 2 : cell.halfY;
  const { chart, edges, outer, inner, home } = cell;
  const nearest = cell.nearest - Math.hypot(acrossX ? halfX : 0, acrossY ? halfY : 0);
  const parts: Cell[] = [];
  for (let x = acrossX ? -1 : 0; x <= 1; x += 2) {
    for (let y = acrossY ? -1 : 0; y <= 1; y += 2) {
      const [centreX, centreY] = [cell.x + x * halfX, cell.y + y * halfY];
      parts.push({ chart, x: centreX, y: centreY, halfX, halfY, edges, outer, inner, home, nearest });
    }
  }
  return parts;
}

/** Whether the whole cell lies where the optimum is the only one. */
export function covers(optimum: Optimum, { chart, x, y, halfX, halfY }: Region): boolean {
  if (optimum.basin === 0 || optimum.chart !== chart) return false;
  return Math.hypot(Math.abs(x - optimum.x) + halfX, Math.abs(y - optimum.y) + halfY) < optimum.basin;
}

/** Whether the optimum lies in the region. */
export function holds({ chart, x, y, halfX, halfY }: Region, optimum: Optimum): boolean {
  return optimum.chart === chart && Math.abs(x - optimum.x) <= halfX && Math.abs(y - optimum.y) <= halfY;
}
