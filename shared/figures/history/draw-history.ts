import { drawVerdictMark } from "../draw-verdict-mark.ts";
import { flowKey, wrapWords, type KeyEntry } from "../flow-key.ts";
import { lettering, type Figure, type Pen, type Point, type Shape } from "../shape.ts";
import { writeFactor } from "../write-number.ts";
import { describeHistory } from "./describe-history.ts";
import type { HistoryDrift, HistoryModel, HistoryPlace, HistoryStation } from "./history-model.ts";
import { placePanels, scaleHistory, type HistoryScale } from "./scale-history.ts";

/**
 * Every station's place over the outages, one panel a station: v over h, as elevation stands over plan, all at one
 * scale. From found to left the part was moved; from left to found it drifted. `width` in sheet millimetres.
 */
export function drawHistory(model: HistoryModel, width: number): Figure {
  const scale = scaleHistory(model, width);
  const panels = placePanels(model, scale);
  const shapes: Shape[] = model.stations.flatMap((station, index) => {
    const at = panels.at[index];
    return at ? drawPanel(model, station, at, scale) : [];
  });
  let height = panels.height;
  const sentences = [
    `Strips show v (up is high) over h (up is right), each ${scale.range.toFixed(scale.rangeDecimals)} ${model.offsetUnit} high about zero, the outage's own axis; magnified ${writeFactor(scale.magnification)} times at the full size of the sheet.`,
    `Outages: ${model.outages.map(({ title, day }, index) => `${index + 1} ${title}, ${day}`).join("; ")}.`,
  ];
  for (const entries of [
    keyOf(),
    ...sentences.flatMap((words) => wrapWords(words, width).map((line) => [line])),
  ]) {
    const placed = flowKey(entries, { x: 0, y: height }, width);
    shapes.push(...placed.shapes);
    height += placed.height;
  }
  return {
    width,
    height: height + 1,
    shapes,
    title: "History over the outages",
    alternative: describeHistory(model),
  };
}

function drawPanel(model: HistoryModel, station: HistoryStation, at: Point, scale: HistoryScale): Shape[] {
  const name: Shape = {
    kind: "text",
    at: { x: at.x, y: at.y + lettering.height },
    text: station.reference ? `${station.id} (ref.)` : station.id,
    height: lettering.height,
    anchor: "start",
    tone: "ink",
  };
  const top = at.y + lettering.height * 1.7;
  const strips = (["v", "h"] as const).flatMap((plane, index) =>
    drawStrip(
      model,
      station,
      plane,
      { x: at.x, y: top + index * (scale.stripHeight + scale.stripGap) },
      scale,
    ),
  );
  const baseline = top + 2 * scale.stripHeight + scale.stripGap + lettering.height * 1.5;
  const numbers = model.outages.map((_, outage): Shape => ({
    kind: "text",
    at: { x: at.x + scale.stripLeft + (outage + 0.5) * scale.outageWidth, y: baseline },
    text: String(outage + 1),
    height: lettering.height,
    anchor: "middle",
    tone: "muted",
  }));
  return [name, ...strips, ...numbers];
}

function drawStrip(
  model: HistoryModel,
  station: HistoryStation,
  plane: "h" | "v",
  at: Point,
  scale: HistoryScale,
): Shape[] {
  const left = at.x + scale.stripLeft;
  const right = left + model.outages.length * scale.outageWidth;
  const bottom = at.y + scale.stripHeight;
  const middle = at.y + scale.stripHeight / 2;
  const pointOf = (place: HistoryPlace): Point => ({
    x: left + (place.outage + (place.moment === "found" ? 0.28 : 0.72)) * scale.outageWidth,
    y: middle - place[plane] * scale.perOffset,
  });
  return [
    {
      kind: "text",
      at: { x: at.x, y: middle + lettering.height / 2 },
      text: plane,
      height: lettering.height,
      anchor: "start",
      tone: "muted",
    },
    ...model.outages.slice(1).map((_, index): Shape => {
      const x = left + (index + 1) * scale.outageWidth;
      return { kind: "line", pen: "grid", from: { x, y: at.y }, to: { x, y: bottom } };
    }),
    { kind: "line", pen: "centre", from: { x: left, y: middle }, to: { x: right, y: middle } },
    ...drawPath(station, pointOf),
    ...station.places.flatMap((place) => drawVerdictMark(place.verdict, pointOf(place), 1.1)),
    {
      kind: "path",
      pen: "narrow",
      points: [
        { x: left, y: at.y },
        { x: right, y: at.y },
        { x: right, y: bottom },
        { x: left, y: bottom },
      ],
      closed: true,
    },
  ];
}

/** Moves inside an outage, and the way from where it was left to where it was found. */
function drawPath({ places, drifts }: HistoryStation, pointOf: (place: HistoryPlace) => Point): Shape[] {
  const at = (outage: number, moment: HistoryPlace["moment"]): HistoryPlace | undefined =>
    places.find((place) => place.outage === outage && place.moment === moment);
  const line = (from: HistoryPlace | undefined, to: HistoryPlace | undefined, pen: Pen): Shape[] =>
    from && to ? [{ kind: "line", pen, from: pointOf(from), to: pointOf(to) }] : [];
  const outages = [...new Set(places.map(({ outage }) => outage))];
  return [
    ...outages.flatMap((outage) => line(at(outage, "found"), at(outage, "left"), "narrow")),
    ...drifts.flatMap((drift) => line(at(drift.from, "left"), at(drift.to, "found"), driftPen(drift))),
  ];
}

const driftPen = ({ changed }: HistoryDrift): Pen => (changed === true ? "signal" : "dashed");

function keyOf(): KeyEntry[] {
  const line = (words: string, pen: Pen): KeyEntry => ({
    words,
    sampleWidth: 9,
    sample: (at) => [{ kind: "line", pen, from: at, to: { x: at.x + 9, y: at.y } }],
  });
  const marks = (["conforms", "undecided", "exceeds", null] as const).map((verdict): KeyEntry => ({
    words: verdict ?? "not judged",
    sampleWidth: 3,
    sample: (at) => drawVerdictMark(verdict, { x: at.x + 1.5, y: at.y }, 1.1),
  }));
  return [
    ...marks,
    line("moved, from found to left", "narrow"),
    line("drifted, as the test shows", "signal"),
    line("no drift shown, or not tested", "dashed"),
  ];
}
