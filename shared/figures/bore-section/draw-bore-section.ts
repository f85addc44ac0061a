import { flowKey, wrapWords, type KeyEntry } from "../flow-key.ts";
import { moveShape } from "../move-shape.ts";
import { lettering, onClock, type Figure, type Point, type Shape } from "../shape.ts";
import { stepAtMost } from "../pick-step.ts";
import { writeFactor, writeTick } from "../write-number.ts";
import type { BoreSectionModel } from "./bore-section-model.ts";
import { describeBoreSection } from "./describe-bore-section.ts";
import { drawCentre } from "./draw-centre.ts";
import { drawWallPoints } from "./draw-wall-points.ts";
import { scaleBoreSection, type BoreSectionScale } from "./scale-bore-section.ts";

/** A gap in the readings at least this wide is marked outside the circle. */
const markedGapDeg = 45;
const largestSide = 190;

/**
 * Figure 1, bore section: the fitted circle, every reading at its magnified residual, contacts, excluded points
 * struck, the way from the origin to the centre. `width` in sheet millimetres.
 */
export function drawBoreSection(model: BoreSectionModel, width: number): Figure {
  const side = Math.min(width, largestSide);
  const scale = scaleBoreSection(model, side);
  const section: Shape[] = [
    ...drawRings(scale),
    ...drawCentre(model, scale),
    { kind: "circle", pen: "wide", centre: scale.centre, radius: scale.circleRadius },
    ...drawGap(model, scale),
    ...drawWallPoints(model, scale),
    ...drawClock(scale),
  ];
  const key = flowKey(entriesOf(model, scale), { x: 0, y: side }, width);
  const notes = notesOf(model, scale).map((note) => wrapWords(note, width));
  let height = side + key.height + lettering.height * 0.6;
  const noteShapes: Shape[] = [];
  for (const line of notes.flat()) {
    const placed = flowKey([line], { x: 0, y: height }, width);
    noteShapes.push(...placed.shapes);
    height += placed.height;
  }
  const shiftRight = (width - side) / 2;
  return {
    width,
    height: height + 1,
    shapes: [
      ...section.map((shape) => moveShape(shape, { x: shiftRight, y: 0 })),
      ...key.shapes,
      ...noteShapes,
    ],
    title: `Bore section ${model.id}`,
    alternative: describeBoreSection(model),
  };
}

function drawRings(scale: BoreSectionScale): Shape[] {
  return scale.rings.map((ring) => ({
    kind: "circle",
    pen: "grid",
    centre: scale.centre,
    radius: scale.circleRadius + ring * scale.residualScale,
  }));
}

function drawClock(scale: BoreSectionScale): Shape[] {
  const radius = scale.circleRadius * 1.06 + scale.reach;
  const words = (at: Point, text: string, anchor: "start" | "middle" | "end"): Shape => {
    return { kind: "text", at, text, height: lettering.height, anchor, tone: "muted" };
  };
  const { x, y } = scale.centre;
  const middle = y + lettering.height / 2;
  return [
    words({ x, y: y - radius - 1.5 }, "0\u00b0 up", "middle"),
    words({ x: x + radius + 1.5, y: middle }, "90\u00b0", "start"),
    words({ x, y: y + radius + 1.5 + lettering.height }, "180\u00b0", "middle"),
    words({ x: x - radius - 1.5, y: middle }, "270\u00b0", "end"),
  ];
}

function drawGap(model: BoreSectionModel, scale: BoreSectionScale): Shape[] {
  const gap = widestGap(model);
  if (gap === null || gap.endDeg - gap.startDeg < markedGapDeg) return [];
  const radius = scale.circleRadius + scale.reach * 0.55;
  const tick = (clockDeg: number): Shape => ({
    kind: "line",
    pen: "narrow",
    from: onClock(scale.centre, radius - 1.5, clockDeg),
    to: onClock(scale.centre, radius + 1.5, clockDeg),
  });
  return [
    { kind: "arc", pen: "dashed", centre: scale.centre, radius, startDeg: gap.startDeg, endDeg: gap.endDeg },
    tick(gap.startDeg),
    tick(gap.endDeg),
  ];
}

function widestGap(model: BoreSectionModel): { startDeg: number; endDeg: number } | null {
  const angles = model.points
    .filter((point) => point.used)
    .map((point) => point.clockDeg)
    .sort((a, b) => a - b);
  return angles.reduce<{ startDeg: number; endDeg: number } | null>((widest, startDeg, index) => {
    const endDeg = angles[index + 1] ?? (angles[0] ?? 0) + 360;
    return widest === null || endDeg - startDeg > widest.endDeg - widest.startDeg
      ? { startDeg, endDeg }
      : widest;
  }, null);
}

function entriesOf(model: BoreSectionModel, scale: BoreSectionScale): KeyEntry[] {
  const entries: KeyEntry[] = [
    {
      words: "reading",
      sampleWidth: 1.5,
      sample: (at) => [
        { kind: "circle", pen: null, centre: { x: at.x + 0.75, y: at.y }, radius: 0.75, fill: "ink" },
      ],
    },
  ];
  if (model.points.some((point) => point.contact)) {
    entries.push({
      words: "contact",
      sampleWidth: 3.8,
      sample: (at) => [
        { kind: "circle", pen: "wide", centre: { x: at.x + 1.9, y: at.y }, radius: 1.9 },
        { kind: "circle", pen: null, centre: { x: at.x + 1.9, y: at.y }, radius: 0.75, fill: "ink" },
      ],
    });
  }
  if (model.points.some((point) => !point.used)) {
    entries.push({
      words: "excluded",
      sampleWidth: 2.6,
      sample: ({ x, y }) => [
        { kind: "line", pen: "signal", from: { x, y: y - 1.3 }, to: { x: x + 2.6, y: y + 1.3 } },
        { kind: "line", pen: "signal", from: { x, y: y + 1.3 }, to: { x: x + 2.6, y: y - 1.3 } },
      ],
    });
  }
  if (scale.centreScale !== null) entries.push(centreScaleBar(model, scale, scale.centreScale));
  return entries;
}

/** A bar of a round length at the centre's scale: true at whatever size the sheet is shown. */
function centreScaleBar(model: BoreSectionModel, scale: BoreSectionScale, centreScale: number): KeyEntry {
  const step = stepAtMost((scale.circleRadius * 0.5) / centreScale);
  const length = step * centreScale;
  return {
    words: `${writeTick(step, step)} ${model.offsetUnit} of centre`,
    sampleWidth: length,
    sample: ({ x, y }) => [
      { kind: "line", pen: "wide", from: { x, y }, to: { x: x + length, y } },
      { kind: "line", pen: "wide", from: { x, y: y - 1 }, to: { x, y: y + 1 } },
      { kind: "line", pen: "wide", from: { x: x + length, y: y - 1 }, to: { x: x + length, y: y + 1 } },
    ],
  };
}

function notesOf(model: BoreSectionModel, scale: BoreSectionScale): string[] {
  const ring = `one ring ${writeTick(scale.ringStep, scale.ringStep)} ${model.offsetUnit}`;
  const against =
    scale.exaggeration === null
      ? `Residuals exaggerated: ${ring}.`
      : `Residuals exaggerated ${writeFactor(scale.exaggeration)} times against the circle as drawn: ${ring}.`;
  const arrow = scale.centreScale === null ? [] : [`Arrow from the ${model.originWords} to the centre.`];
  return ["Seen looking downstream.", against, ...arrow];
}
