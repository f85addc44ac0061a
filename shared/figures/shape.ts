/**
 * A drawing as plain data: lines, arcs and text in sheet millimetres, x to the right and y down from the top left.
 * Whatever draws it (screen, SVG, PDF, DXF) maps pens and tones to its own means and adds nothing.
 */
export interface Point {
  readonly x: number;
  readonly y: number;
}

/** Ink: drawn and true. Muted: explains. Faint: guides the eye. Signal: a person must look at it. */
export type Tone = "ink" | "muted" | "faint" | "signal";
export type Fill = Tone | "paper" | "shade";

/** Line widths and dashes of ISO 128-2, in sheet millimetres. */
export interface PenStyle {
  readonly width: number;
  readonly dash?: readonly number[];
  readonly tone: Tone;
}
export const pens = {
  /** Continuous wide: edges and the result itself. */
  wide: { width: 0.5, tone: "ink" },
  /** Continuous narrow: leaders, bars, traces. */
  narrow: { width: 0.25, tone: "ink" },
  /** Continuous narrow, held back: what stands behind the result. */
  quiet: { width: 0.25, tone: "muted" },
  /** Continuous, faint: rings, grid. */
  grid: { width: 0.18, tone: "faint" },
  /** Long-dashed dotted narrow: centre lines and the axis. */
  centre: { width: 0.25, dash: [6, 1, 0.5, 1], tone: "ink" },
  /** Dashed narrow: a state that has been replaced. */
  dashed: { width: 0.25, dash: [2.5, 1.2], tone: "muted" },
  /** Wide, signal: what a person must look at. */
  signal: { width: 0.4, tone: "signal" },
} as const satisfies Record<string, PenStyle>;
export type Pen = keyof typeof pens;

export type Shape =
  | { readonly kind: "line"; readonly pen: Pen; readonly from: Point; readonly to: Point }
  | {
      readonly kind: "path";
      readonly pen: Pen | null;
      readonly points: readonly Point[];
      readonly closed: boolean;
      readonly fill?: Fill;
    }
  | {
      readonly kind: "circle";
      readonly pen: Pen | null;
      readonly centre: Point;
      readonly radius: number;
      readonly fill?: Fill;
    }
  | {
      /** Clockwise on the sheet from `startDeg` to `endDeg`, both clockwise from the top. */
      readonly kind: "arc";
      readonly pen: Pen;
      readonly centre: Point;
      readonly radius: number;
      readonly startDeg: number;
      readonly endDeg: number;
    }
  | {
      readonly kind: "text";
      /** On the baseline. */
      readonly at: Point;
      readonly text: string;
      /** Height of a capital, as ISO 3098 states lettering. */
      readonly height: number;
      readonly anchor: "start" | "middle" | "end";
      readonly tone: Tone;
      /** Turned anticlockwise about `at`. */
      readonly turnDeg?: number;
    };

export interface Figure {
  readonly width: number;
  readonly height: number;
  readonly shapes: readonly Shape[];
  readonly title: string;
  /** What the drawing shows, in sentences, for who cannot see it. */
  readonly alternative: string;
}

/** Lettering of ISO 3098: capitals 2.5 mm high, in a type whose advance and capital height are those of IBM Plex Mono. */
export const lettering = {
  height: 2.5,
  /** Capital height over the size of the type. */
  capitalPerSize: 0.698,
  advancePerSize: 0.6,
} as const;

/** Length that a line of text takes on the sheet. */
export function textWidth(text: string, height: number = lettering.height): number {
  return (text.length * lettering.advancePerSize * height) / lettering.capitalPerSize;
}

/** The point at `radius` from `centre`, `clockDeg` clockwise from the top. */
export function onClock(centre: Point, radius: number, clockDeg: number): Point {
  const angleRad = (clockDeg * Math.PI) / 180;
  return { x: centre.x + radius * Math.sin(angleRad), y: centre.y - radius * Math.cos(angleRad) };
}
