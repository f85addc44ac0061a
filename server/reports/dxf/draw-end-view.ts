import { lineSpacing, type Drawing, type Place } from "./drawing.ts";
import type { DrawnMachine, DrawnStation } from "./drawn-machine.ts";
import { endViewWords } from "./end-view-words.ts";
import { writeTimes, type SheetScale } from "./sheet-scale.ts";

/** Every station seen looking downstream: how its bore lies off its target, all at one magnification. */
export function drawEndViews(drawing: Drawing, machine: DrawnMachine, scale: SheetScale): void {
  const { letter, endViews } = scale;
  if (machine.stations.length === 0) return;
  drawing.text(
    "TEXT",
    [endViews.left, endViews.top + 3 * letter],
    `END VIEWS: looking downstream, h to the right, v up; ${writeTimes(endViews.exaggeration)} as large; the middle is the target`,
    { height: 1.6 * letter },
  );
  machine.stations.forEach((station, index) => {
    const column = index % endViews.columns;
    const row = Math.floor(index / endViews.columns);
    const corner: Place = [endViews.left + column * endViews.cell, endViews.top - row * endViews.row];
    drawStation(drawing, machine, station, scale, corner);
  });
}

function drawStation(
  drawing: Drawing,
  machine: DrawnMachine,
  station: DrawnStation,
  { letter, endViews: { cell, half, exaggeration } }: SheetScale,
  [left, top]: Place,
): void {
  const { name, under } = endViewWords(machine, station, cell, letter);
  const x = left + cell / 2;
  const lines = (layer: "STATIONS" | "TEXT", words: readonly string[], from: number) =>
    words.forEach((line, index) => {
      const place: Place = [x, from - (index + 1) * lineSpacing * letter];
      drawing.text(layer, place, line, { height: letter, align: "middle" });
    });
  lines("STATIONS", name, top);
  const y = top - (name.length + 0.5) * lineSpacing * letter - half;
  const place = (h: number, v: number): Place => [x + exaggeration * h, y + exaggeration * v];
  drawing.line("AXIS", [x - half, y], [x + half, y]);
  drawing.line("AXIS", [x, y - half], [x, y + half]);
  const { allowedMm } = station;
  if (allowedMm?.radius) drawing.circle("TOLERANCE", [x, y], exaggeration * allowedMm.radius);
  else if (allowedMm)
    drawing.box("TOLERANCE", place(allowedMm.h[0], allowedMm.v[0]), place(allowedMm.h[1], allowedMm.v[1]));
  for (const { layer, bores } of machine.surveys) {
    for (const { deviationMm } of bores.filter((bore) => bore.station.id === station.id)) {
      const tip = place(deviationMm.h, deviationMm.v);
      drawing.line(layer, [x, y], tip);
      drawing.circle(layer, tip, letter * 0.4);
    }
  }
  lines("TEXT", under, y - half);
}

const words = {
  AXIS: "axis",
  TARGET: "targets",
  TOLERANCE: "tolerance about the target",
  UNCERTAINTY: "expanded uncertainty",
} as const;

/** What each line stands for, beside the elevation. */
export function drawKey(
  drawing: Drawing,
  { surveys }: DrawnMachine,
  { key: [x, y], letter }: SheetScale,
): void {
  const rows = [
    ...(["AXIS", "TARGET", "TOLERANCE"] as const).map((layer) => [layer, words[layer]] as const),
    ...surveys.map(({ layer, name }) => [layer, name] as const),
    ...(surveys.length > 0 ? [["UNCERTAINTY", words.UNCERTAINTY] as const] : []),
  ];
  rows.forEach(([layer, text], index) => {
    const at = y - 2.2 * index * letter;
    drawing.line(layer, [x, at + letter / 2], [x + 9 * letter, at + letter / 2]);
    drawing.text("TEXT", [x + 10 * letter, at], text, { height: letter });
  });
}
