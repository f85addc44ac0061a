import { drawArrow } from "../draw-arrow.ts";
import { drawVerdictMark, type Verdict } from "../draw-verdict-mark.ts";
import { flowKey, wrapWords, type KeyEntry } from "../flow-key.ts";
import { lettering, textWidth, type Figure, type Point, type Shape } from "../shape.ts";
import { writeFactor, writeTick } from "../write-number.ts";
import type { PlanePair } from "../plan-elevation/plan-elevation-model.ts";
import { describeEndView } from "./describe-end-view.ts";
import type { EndViewModel, EndViewStation } from "./end-view-model.ts";
import { scaleEndView, type EndViewScale } from "./scale-end-view.ts";

/**
 * Figure 3, end view: each station's deviation as a vector from its own target, looking downstream, in its tolerance;
 * all stations at one scale. `width` in sheet millimetres; the cells fill `height` where they can.
 */
export function drawEndView(
  model: EndViewModel,
  width: number,
  { height = width * 0.55, reach }: { readonly height?: number; readonly reach?: number } = {},
): Figure {
  const scale = scaleEndView(model, width, height, reach);
  const shapes = model.stations.flatMap((station, index) =>
    drawStation(model, station, scale.origins[index] ?? { x: 0, y: 0 }, scale),
  );
  let bottom = scale.height + lettering.height;
  const note =
    `Seen looking downstream: right is right, up is high. Deviations magnified ${writeFactor(scale.magnification)} times at ` +
    "the full size of the sheet, all stations at one scale. The middle of each view is the station's own target.";
  for (const entries of [entriesOf(model, scale), ...wrapWords(note, width).map((line) => [line])]) {
    const placed = flowKey(entries, { x: 0, y: bottom }, width);
    shapes.push(...placed.shapes);
    bottom += placed.height;
  }
  return { width, height: bottom + 1, shapes, title: "End view", alternative: describeEndView(model) };
}

/** Heights of capitals that a name is tried in before it is cut. */
const nameHeights = [lettering.height, 2, 1.8] as const;
const smallestName = 1.8;

function drawStation(
  model: EndViewModel,
  station: EndViewStation,
  origin: Point,
  scale: EndViewScale,
): Shape[] {
  const half = scale.side / 2 - 1;
  const place = ({ h, v }: PlanePair): Point => ({
    x: origin.x + h * scale.perOffset,
    y: origin.y - v * scale.perOffset,
  });
  const last = model.surveys.length - 1;
  return [
    ...nameOf(station, origin, scale),
    ...drawTolerance(station, origin, place, scale),
    {
      kind: "line",
      pen: "centre",
      from: { x: origin.x - half, y: origin.y },
      to: { x: origin.x + half, y: origin.y },
    },
    {
      kind: "line",
      pen: "centre",
      from: { x: origin.x, y: origin.y - half },
      to: { x: origin.x, y: origin.y + half },
    },
    ...model.surveys.flatMap((survey, index): Shape[] => {
      const found = survey.stations.find(({ id }) => id === station.id);
      if (!found) return [];
      const tip = place(found.deviation);
      const replaced = index < last;
      const vector: Shape[] = replaced
        ? [{ kind: "line", pen: "dashed", from: origin, to: tip }]
        : drawArrow(origin, tip, "wide", Math.min(2.6, Math.hypot(tip.x - origin.x, tip.y - origin.y) / 2));
      return [...vector, ...drawVerdictMark(found.verdict, tip, replaced ? 0.9 : 1.15, replaced)];
    }),
  ];
}

function nameOf(
  { id, reference }: EndViewStation,
  origin: Point,
  { side, nameHeight }: EndViewScale,
): Shape[] {
  const words = reference ? `${id} (ref.)` : id;
  const height = nameHeights.find((one) => textWidth(words, one) <= side - 1) ?? smallestName;
  return [
    {
      kind: "text",
      at: { x: origin.x, y: origin.y - side / 2 - nameHeight * 0.2 },
      text: cutMiddle(words, Math.floor((side - 1) / textWidth("0", height))),
      height,
      anchor: "middle",
      tone: "ink",
    },
  ];
}

/** Names often differ at their ends: what is cut is the middle. */
function cutMiddle(words: string, room: number): string {
  if (words.length <= room) return words;
  const kept = Math.max(1, Math.floor((room - 1) / 2));
  return `${words.slice(0, kept)}\u2026${words.slice(-kept)}`;
}

function drawTolerance(
  { tolerance }: EndViewStation,
  origin: Point,
  place: (offset: PlanePair) => Point,
  { perOffset }: EndViewScale,
): Shape[] {
  if (!tolerance) return [];
  if (tolerance.kind === "ring")
    return [
      { kind: "circle", pen: "quiet", centre: origin, radius: tolerance.radius * perOffset, fill: "shade" },
    ];
  const { h, v } = tolerance;
  const corners = [
    { h: h[0], v: v[0] },
    { h: h[1], v: v[0] },
    { h: h[1], v: v[1] },
    { h: h[0], v: v[1] },
  ];
  return [{ kind: "path", pen: "quiet", points: corners.map(place), closed: true, fill: "shade" }];
}

function entriesOf(model: EndViewModel, scale: EndViewScale): KeyEntry[] {
  const unjudged = model.surveys.some(({ stations }) => stations.some(({ verdict }) => verdict === null));
  const verdicts: (Verdict | null)[] = ["conforms", "undecided", "exceeds", ...(unjudged ? [null] : [])];
  const last = model.surveys.length - 1;
  return [
    scaleBar(model, scale),
    ...verdicts.map((verdict): KeyEntry => ({
      words: verdict ?? "not judged",
      sampleWidth: 3,
      sample: (at) => drawVerdictMark(verdict, { x: at.x + 1.5, y: at.y }, 1.15),
    })),
    ...model.surveys.map(({ name }, index): KeyEntry => ({
      words: name,
      sampleWidth: 9,
      sample: (at) => {
        const to = { x: at.x + 9, y: at.y };
        return index < last ? [{ kind: "line", pen: "dashed", from: at, to }] : drawArrow(at, to, "wide");
      },
    })),
    ...(model.stations.some(({ tolerance }) => tolerance) ? [toleranceKey] : []),
  ];
}

const toleranceKey: KeyEntry = {
  words: "tolerance",
  sampleWidth: 3.4,
  sample: ({ x, y }) => [
    { kind: "circle", pen: "quiet", centre: { x: x + 1.7, y }, radius: 1.7, fill: "shade" },
  ],
};

/** A bar of a round length: true at whatever size the sheet is shown. */
function scaleBar({ offsetUnit }: EndViewModel, { step, perOffset }: EndViewScale): KeyEntry {
  const length = step * perOffset;
  return {
    words: `${writeTick(step, step)} ${offsetUnit} of deviation`,
    sampleWidth: length,
    sample: ({ x, y }) => [
      { kind: "line", pen: "wide", from: { x, y }, to: { x: x + length, y } },
      { kind: "line", pen: "wide", from: { x, y: y - 1 }, to: { x, y: y + 1 } },
      { kind: "line", pen: "wide", from: { x: x + length, y: y - 1 }, to: { x: x + length, y: y + 1 } },
    ],
  };
}
