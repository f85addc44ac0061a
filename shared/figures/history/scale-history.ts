import { lettering, textWidth, type Point } from "../shape.ts";
import { decimalsAcross, decimalsFor, convertLength } from "../write-number.ts";
import type { HistoryModel } from "./history-model.ts";

export interface HistoryScale {
  readonly columns: number;
  readonly panelWidth: number;
  readonly panelHeight: number;
  readonly stripHeight: number;
  readonly stripGap: number;
  /** Room for the letter of the plane before a strip. */
  readonly stripLeft: number;
  readonly outageWidth: number;
  /** Sheet millimetres of one offset unit. */
  readonly perOffset: number;
  /** What a strip is high, in offset units. */
  readonly range: number;
  readonly rangeDecimals: number;
  readonly magnification: number;
}

const stripHeight = 18;
const stripGap = 2;
const stripLeft = 4;
const gap = 6;
const outageWidthLeast = 9;
const outageWidthMost = 24;
const panelWidthLeast = 44;
/** Half a pen, so that the frame of the last panel is not cut. */
const edge = 0.25;
/** Room above the furthest place, so that its mark stays inside the strip. */
const headroom = 1.25;

/** Panels side by side as many as fit, all of one scale, about zero. */
export function scaleHistory(model: HistoryModel, width: number): HistoryScale {
  const { outages, stations, offsetUnit } = model;
  const names = stations.map(({ id, reference }) => textWidth(reference ? `${id} (ref.)` : id));
  const least = Math.max(panelWidthLeast, stripLeft + outages.length * outageWidthLeast, ...names);
  const columns = Math.max(1, Math.min(stations.length, Math.floor((width + gap) / (least + gap))));
  const panelWidth = (width - edge - (columns - 1) * gap) / columns;
  const furthest = Math.max(
    0,
    ...stations.flatMap(({ places }) => places.flatMap(({ h, v }) => [Math.abs(h), Math.abs(v)])),
  );
  const half = furthest === 0 ? 1 : furthest * headroom;
  const perOffset = stripHeight / (2 * half);
  return {
    columns,
    panelWidth,
    panelHeight: 2 * stripHeight + stripGap + lettering.height * 5.2,
    stripHeight,
    stripGap,
    stripLeft,
    outageWidth: Math.min(outageWidthMost, (panelWidth - stripLeft) / Math.max(1, outages.length)),
    perOffset,
    range: 2 * half,
    rangeDecimals: Math.min(decimalsFor([2 * half], 0), decimalsAcross(offsetUnit)),
    magnification: perOffset / convertLength(1, offsetUnit, "mm"),
  };
}

/** Top left of every panel, row by row, and the height that all take. */
export function placePanels(
  { stations }: HistoryModel,
  { columns, panelWidth, panelHeight }: HistoryScale,
): { readonly at: readonly Point[]; readonly height: number } {
  return {
    at: stations.map((_, index) => ({
      x: (index % columns) * (panelWidth + gap),
      y: Math.floor(index / columns) * panelHeight,
    })),
    height: Math.ceil(stations.length / columns) * panelHeight,
  };
}
