import { whitePaperColours as colours } from "../../../../shared/figures/paper-colours.ts";
import {
  lettering,
  onClock,
  pens,
  textWidth,
  type Fill,
  type Pen,
  type Point,
  type Shape,
  type Tone,
} from "../../../../shared/figures/shape.ts";
import { fontFor, fontName, registerFonts, type Script, type Weight } from "./fonts.ts";

export const pointsPerMm = 72 / 25.4;

export interface Lettered {
  readonly height?: number;
  readonly anchor?: "start" | "middle" | "end";
  readonly tone?: Tone;
  readonly weight?: Weight;
  readonly turnDeg?: number;
}

/** Draws on the current page in millimetres from its top left. */
export class Canvas {
  constructor(readonly document: PDFKit.PDFDocument) {
    registerFonts(document);
  }

  /** Opens a page whose user space is millimetres. */
  addPage({ width, height }: { readonly width: number; readonly height: number }): void {
    this.document.addPage({ size: [width * pointsPerMm, height * pointsPerMm], margin: 0 });
    this.document.scale(pointsPerMm);
  }

  /** One line of text on its baseline. */
  text(text: string, at: Point, lettered: Lettered = {}): void {
    const { height = lettering.height, anchor = "start", tone = "ink", weight = 400, turnDeg } = lettered;
    const width = textWidth(text, height);
    const left = anchor === "start" ? 0 : anchor === "middle" ? width / 2 : width;
    const { document } = this;
    document.fillColor(colours[tone]);
    if (turnDeg !== undefined) document.save().rotate(-turnDeg, { origin: [at.x, at.y] });
    let column = 0;
    for (const run of runsOf(text)) {
      document
        .font(fontName(run.script, weight))
        .fontSize(height / lettering.capitalPerSize)
        .text(run.text, at.x - left + column * textWidth("0", height), at.y, {
          lineBreak: false,
          baseline: "alphabetic",
        });
      column += run.text.length;
    }
    if (turnDeg !== undefined) document.restore();
  }

  shape(shape: Shape): void {
    const { document } = this;
    switch (shape.kind) {
      case "line":
        document.moveTo(shape.from.x, shape.from.y).lineTo(shape.to.x, shape.to.y);
        return this.ink(shape.pen);
      case "path": {
        const [first, ...rest] = shape.points;
        if (!first) return;
        document.moveTo(first.x, first.y);
        for (const point of rest) document.lineTo(point.x, point.y);
        if (shape.closed) document.closePath();
        return this.ink(shape.pen, shape.fill);
      }
      case "circle":
        document.circle(shape.centre.x, shape.centre.y, shape.radius);
        return this.ink(shape.pen, shape.fill);
      case "arc": {
        const { centre, radius, startDeg, endDeg, pen } = shape;
        const from = onClock(centre, radius, startDeg);
        const to = onClock(centre, radius, endDeg);
        const large = endDeg - startDeg > 180 ? 1 : 0;
        document.path(`M ${from.x} ${from.y} A ${radius} ${radius} 0 ${large} 1 ${to.x} ${to.y}`);
        return this.ink(pen);
      }
      case "text": {
        const { height, anchor, tone, turnDeg } = shape;
        return this.text(shape.text, shape.at, {
          height,
          anchor,
          tone,
          ...(turnDeg === undefined ? {} : { turnDeg }),
        });
      }
    }
  }

  line(from: Point, to: Point, width: number, tone: Tone = "ink"): void {
    this.document
      .undash()
      .lineWidth(width)
      .strokeColor(colours[tone])
      .moveTo(from.x, from.y)
      .lineTo(to.x, to.y)
      .stroke();
  }

  rectangle(
    left: number,
    top: number,
    right: number,
    bottom: number,
    width: number,
    tone: Tone = "ink",
  ): void {
    this.document
      .undash()
      .lineWidth(width)
      .strokeColor(colours[tone])
      .rect(left, top, right - left, bottom - top)
      .stroke();
  }

  /** Draws something smaller, about an origin of its own. */
  within(origin: Point, scale: number, draw: () => void): void {
    this.document.save().translate(origin.x, origin.y).scale(scale);
    draw();
    this.document.restore();
  }

  private ink(pen: Pen | null, fill?: Fill): void {
    const { document } = this;
    if (pen === null) {
      if (fill) document.fill(colours[fill]);
      return;
    }
    const { width, tone, ...style } = pens[pen];
    if ("dash" in style) document.dash([...style.dash] as never, {});
    else document.undash();
    document.lineWidth(width);
    if (fill) document.fillAndStroke(colours[fill], colours[tone]);
    else document.stroke(colours[tone]);
  }
}

/** Stretches of text that one file of the type has all letters of. */
function runsOf(text: string): { script: Script; text: string }[] {
  const runs: { script: Script; text: string }[] = [];
  for (const character of text) {
    const last = runs.at(-1);
    const script = character === " " && last ? last.script : (fontFor(character) ?? "latin");
    if (last?.script === script) last.text += character;
    else runs.push({ script, text: character });
  }
  return runs;
}
