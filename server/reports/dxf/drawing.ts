import {
  DxfWriter,
  LWPolylineFlags,
  TextHorizontalAlignment,
  TextVerticalAlignment,
  Units,
  point2d,
  point3d,
} from "@tarikjabiri/dxf";
import { wrapText } from "../wrap-text.ts";

/** Every layer, with its colour by the AutoCAD colour index and its line type. */
const layers = {
  AXIS: { colour: 1, lineType: "CENTER" },
  STATIONS: { colour: 8, lineType: "Continuous" },
  TARGET: { colour: 7, lineType: "DASHED" },
  TOLERANCE: { colour: 3, lineType: "Continuous" },
  "AS-FOUND": { colour: 30, lineType: "Continuous" },
  "AS-LEFT": { colour: 5, lineType: "Continuous" },
  UNCERTAINTY: { colour: 9, lineType: "Continuous" },
  DIMENSIONS: { colour: 8, lineType: "Continuous" },
  TEXT: { colour: 7, lineType: "Continuous" },
  "TITLE-BLOCK": { colour: 7, lineType: "Continuous" },
  DRAFT: { colour: 1, lineType: "Continuous" },
} as const;

export type LayerName = keyof typeof layers;
export const layerNames = Object.keys(layers) as LayerName[];

export type Place = readonly [x: number, y: number];

interface Lettering {
  readonly height: number;
  readonly align?: "left" | "middle" | "right";
  readonly rotationDeg?: number;
}

const alignments = {
  left: TextHorizontalAlignment.Left,
  middle: TextHorizontalAlignment.Center,
  right: TextHorizontalAlignment.Right,
} as const;

/** Between baselines, in heights of a letter. */
export const lineSpacing = 1.7;

/** Lines of `text` that fit a width, a letter's width left free on both sides; none of empty text. */
export function linesIn(width: number, letter: number, text: string): string[] {
  const room = (width - 2 * letter) / (letter * Drawing.signWidth);
  const words = text.replaceAll(/\s+/g, " ").trim();
  return words === "" ? [] : wrapText(words, room);
}

/** A drawing in millimetres. Coordinates are kept to a nanometre, so that no number needs an exponent. */
export class Drawing {
  private readonly writer = new DxfWriter();
  /** Width of a sign over its height, for what has to fit: that of the widest common fonts. */
  static readonly signWidth = 0.9;

  constructor(dashMm: number) {
    const { writer } = this;
    writer.setUnits(Units.Millimeters);
    writer.setVariable("$MEASUREMENT", { 70: 1 });
    writer.setVariable("$LASTSAVEDBY", { 1: "Borewright" });
    writer.addLType("CENTER", "long, short", [4 * dashMm, -dashMm, dashMm, -dashMm]);
    writer.addLType("DASHED", "dashes", [2 * dashMm, -dashMm]);
    for (const name of layerNames) writer.addLayer(name, layers[name].colour, layers[name].lineType);
  }

  line(layerName: LayerName, from: Place, to: Place): void {
    this.writer.addLine(at3(from), at3(to), { layerName });
  }

  path(layerName: LayerName, places: readonly Place[], closed = false): void {
    if (places.length < 2) return;
    this.writer.addLWPolyline(
      places.map((place) => ({ point: point2d(near(place[0]), near(place[1])) })),
      { layerName, flags: closed ? LWPolylineFlags.Closed : LWPolylineFlags.None },
    );
  }

  box(layerName: LayerName, [left, bottom]: Place, [right, top]: Place): void {
    this.path(
      layerName,
      [
        [left, bottom],
        [right, bottom],
        [right, top],
        [left, top],
      ],
      true,
    );
  }

  circle(layerName: LayerName, centre: Place, radius: number): void {
    this.writer.addCircle(at3(centre), near(radius), { layerName });
  }

  /** Its foot stands at `place`; empty text is not drawn. */
  text(layerName: LayerName, place: Place, text: string, { height, align, rotationDeg }: Lettering): void {
    const words = plainText(text);
    if (words === "") return;
    this.writer.addText(at3(place), near(height), words, {
      layerName,
      ...(rotationDeg ? { rotation: rotationDeg } : {}),
      ...(align && align !== "left"
        ? {
            horizontalAlignment: alignments[align],
            verticalAlignment: TextVerticalAlignment.BaseLine,
            secondAlignmentPoint: at3(place),
          }
        : {}),
    });
  }

  write(): Buffer {
    return Buffer.from(`${this.writer.stringify()}\n`, "utf8");
  }
}

/**
 * One line of text that a reader takes as it stands: a line feed would end the value and start another, %%, ^ and
 * \\U+ begin codes of their own. A caret and a space are a caret; the others are broken by a space that is seen.
 */
export function plainText(text: string): string {
  return text
    .replaceAll(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, " ")
    .replaceAll(/\p{Cs}/gu, "\ufffd")
    .replaceAll(/%(?=%)/g, "% ")
    .replaceAll("^", "^ ")
    .replaceAll(/\\(?=[UM]\+)/gi, "\\ ")
    .trim();
}

const near = (value: number): number => Number(value.toFixed(6));
const at3 = ([x, y]: Place) => point3d(near(x), near(y), 0);
