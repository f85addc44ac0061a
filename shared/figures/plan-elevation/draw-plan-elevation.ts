import { drawArrow } from "../draw-arrow.ts";
import { drawVerdictMark, type Verdict } from "../draw-verdict-mark.ts";
import { flowKey, wrapWords, type KeyEntry } from "../flow-key.ts";
import { ticksBetween } from "../pick-step.ts";
import { lettering, textWidth, type Figure, type Point, type Shape } from "../shape.ts";
import { writeFactor, writeTick } from "../write-number.ts";
import { describePlanElevation } from "./describe-plan-elevation.ts";
import { drawStrip } from "./draw-strip.ts";
import type { PlanElevationModel } from "./plan-elevation-model.ts";
import {
  holdInside,
  labelRowHeight,
  scalePlanElevation,
  type PlanElevationScale,
} from "./scale-plan-elevation.ts";

/**
 * Figure 2, plan and elevation: every station's place relative to the axis in both planes over one z to scale, with the
 * tolerance about its target and its uncertainty. Plan under elevation, as first-angle projection places it.
 * `width` in sheet millimetres.
 */
export function drawPlanElevation(model: PlanElevationModel, width: number): Figure {
  const scale = scalePlanElevation(model, width);
  const drawn: Shape[] = [
    heading("Elevation", `v, ${model.offsetUnit}`, "up is high", scale, scale.elevation.top),
    ...drawStrip(model, scale, scale.elevation),
    ...drawStationNames(model, scale, width),
    heading("Plan from above", `h, ${model.offsetUnit}`, "down is right", scale, scale.plan.top),
    ...drawStrip(model, scale, scale.plan),
    ...drawRule(model, scale),
  ];
  let height = scale.plan.bottom + lettering.height * 5.6;
  const lines = wrapWords(
    `Offsets exaggerated ${writeFactor(scale.exaggeration)} times against z. Zero is the ${model.axisWords}.`,
    width,
  );
  for (const entries of [entriesOf(model), ...lines.map((line) => [line])]) {
    const placed = flowKey(entries, { x: 0, y: height }, width);
    drawn.push(...placed.shapes);
    height += placed.height;
  }
  return {
    width,
    height: height + 1,
    shapes: drawn,
    title: "Plan and elevation",
    alternative: describePlanElevation(model),
  };
}

function heading(
  name: string,
  quantity: string,
  sense: string,
  scale: PlanElevationScale,
  top: number,
): Shape {
  return {
    kind: "text",
    at: { x: scale.left, y: top - 2 },
    text: `${name}: ${quantity}, ${sense}`,
    height: lettering.height,
    anchor: "start",
    tone: "ink",
  };
}

/** Names between the strips, each under its own station; a reference station carries the datum triangle of ISO 5459. */
function drawStationNames(model: PlanElevationModel, scale: PlanElevationScale, width: number): Shape[] {
  return model.stations.flatMap((station, index): Shape[] => {
    const x = scale.placeX(station.z);
    const row = scale.labelRows[index] ?? 0;
    const top = scale.labelsTop;
    const baseline = top + 3.6 + row * labelRowHeight + lettering.height;
    const leader: Shape = {
      kind: "line",
      pen: "quiet",
      from: { x, y: top },
      to: { x, y: baseline - lettering.height - 0.7 },
    };
    const name: Shape = {
      kind: "text",
      at: { x: holdInside(x, textWidth(station.id) / 2, width), y: baseline },
      text: station.id,
      height: lettering.height,
      anchor: "middle",
      tone: station.reference ? "ink" : "muted",
    };
    return [leader, ...(station.reference ? [datum({ x, y: top })] : []), name];
  });
}

function datum(tip: Point): Shape {
  const points = [tip, { x: tip.x + 1.5, y: tip.y + 2.6 }, { x: tip.x - 1.5, y: tip.y + 2.6 }];
  return { kind: "path", pen: "narrow", points, closed: true, fill: "ink" };
}

/** As many ticks of z as have room for their numbers: a step is a round number, so their count is only about one asked for. */
function legibleTicks(low: number, high: number, scale: PlanElevationScale): number[] {
  const perZ = (scale.right - scale.left) / (high - low || 1);
  for (let count = 12; count > 1; count -= 1) {
    const ticks = ticksBetween(low, high, count);
    const step = (ticks[1] ?? 1) - (ticks[0] ?? 0);
    const longest = Math.max(...ticks.map((tick) => textWidth(writeTick(tick, step))));
    if (step * perZ >= longest + 4) return ticks;
  }
  return ticksBetween(low, high, 1);
}

/** The z rule under the plan, with the sense of flow. */
function drawRule(model: PlanElevationModel, scale: PlanElevationScale): Shape[] {
  const zs = model.stations.map((station) => station.z);
  const [low, high] = [Math.min(...zs), Math.max(...zs)];
  const y = scale.plan.bottom;
  const ticks = legibleTicks(low, high, scale);
  const step = (ticks[1] ?? 1) - (ticks[0] ?? 0);
  const baseline = y + 2 + lettering.height;
  const second = baseline + lettering.height * 1.7;
  const words = `z, ${model.axialUnit}, downstream`;
  const wordsEnd = scale.left + textWidth(words) + 2;
  return [
    ...ticks.flatMap((tick): Shape[] => {
      const x = scale.placeX(tick);
      return [
        { kind: "line", pen: "narrow", from: { x, y }, to: { x, y: y + 1.5 } },
        {
          kind: "text",
          at: { x, y: baseline + 0.6 },
          text: writeTick(tick, step),
          height: lettering.height,
          anchor: "middle",
          tone: "muted",
        },
      ];
    }),
    {
      kind: "text",
      at: { x: scale.left, y: second },
      text: words,
      height: lettering.height,
      anchor: "start",
      tone: "muted",
    },
    ...drawArrow(
      { x: wordsEnd, y: second - lettering.height / 2 },
      { x: wordsEnd + 10, y: second - lettering.height / 2 },
      "quiet",
    ),
  ];
}

function entriesOf(model: PlanElevationModel): KeyEntry[] {
  const verdicts = verdictsShown(model).map((verdict): KeyEntry => ({
    words: verdict ?? "not judged",
    sampleWidth: 3,
    sample: (at) => drawVerdictMark(verdict, { x: at.x + 1.5, y: at.y }, 1.35),
  }));
  const line = (words: string, pen: "dashed" | "narrow" | "centre"): KeyEntry => ({
    words,
    sampleWidth: 9,
    sample: (at) => [{ kind: "line", pen, from: at, to: { x: at.x + 9, y: at.y } }],
  });
  const surveys = model.surveys.map((survey, index) =>
    line(survey.name, index < model.surveys.length - 1 ? "dashed" : "narrow"),
  );
  const gate: KeyEntry = {
    words: "tolerance about the target",
    sampleWidth: 3.4,
    sample: ({ x, y }) => [
      {
        kind: "path",
        pen: "quiet",
        points: [
          { x: x + 0.5, y: y - 1.7 },
          { x: x + 2.9, y: y - 1.7 },
          { x: x + 2.9, y: y + 1.7 },
          { x: x + 0.5, y: y + 1.7 },
        ],
        closed: true,
        fill: "shade",
      },
      { kind: "line", pen: "quiet", from: { x, y }, to: { x: x + 3.4, y } },
    ],
  };
  const bar: KeyEntry = {
    words: "expanded uncertainty",
    sampleWidth: 1.8,
    sample: ({ x, y }) => [
      { kind: "line", pen: "wide", from: { x: x + 0.9, y: y - 1.6 }, to: { x: x + 0.9, y: y + 1.6 } },
      { kind: "line", pen: "wide", from: { x, y: y - 1.6 }, to: { x: x + 1.8, y: y - 1.6 } },
      { kind: "line", pen: "wide", from: { x, y: y + 1.6 }, to: { x: x + 1.8, y: y + 1.6 } },
    ],
  };
  const reference: KeyEntry = {
    words: "reference station",
    sampleWidth: 3,
    sample: (at) => [datum({ x: at.x + 1.5, y: at.y - 1.3 })],
  };
  const known = model.surveys.some((survey) =>
    survey.stations.some((station) => station.uncertainty !== null),
  );
  return [
    ...verdicts,
    ...surveys,
    line(model.zero, "centre"),
    gate,
    ...(known ? [bar] : []),
    ...(model.stations.some((station) => station.reference) ? [reference] : []),
  ];
}

/** The three verdicts, so that a reader learns what did not occur; the dot only where it is drawn. */
function verdictsShown(model: PlanElevationModel): (Verdict | null)[] {
  const unjudged = model.surveys.some(({ stations }) => stations.some(({ verdict }) => verdict === null));
  return ["conforms", "undecided", "exceeds", ...(unjudged ? [null] : [])];
}
