import type { AlignmentExample } from "../api/get-worked-example.ts";
import { put, type Check } from "./check.ts";

const planes = ["h", "v"] as const;

/** The component that carries a station, as sent and as answered. */
export function componentOf({ request, result }: AlignmentExample, stationId: string) {
  const sent = request.components?.find(({ stations }) => stations?.includes(stationId));
  const answered = result.moves?.components.find(({ id }) => id === sent?.id);
  return sent && answered ? { sent, answered } : null;
}

type Part = NonNullable<ReturnType<typeof componentOf>>;

/** Where the realised move of a part on two supports leaves a station: d + m(z), m straight between the supports. */
export function checkPrediction(example: AlignmentExample, stationId: string, decimals: number): Check[] {
  const part = componentOf(example, stationId);
  const station = example.result.stations.find(({ id }) => id === stationId);
  const predicted = example.result.moves?.predicted.find(({ id }) => id === stationId);
  const [first, second, ...more] = (part?.sent.supports ?? []).map(({ id, z }) => ({
    z,
    move: part?.answered.realised.find(({ support }) => support === id),
  }));
  if (!station || !predicted || !first?.move || !second?.move || more.length > 0) return [];
  const share = (station.z - first.z) / (second.z - first.z);
  return planes.map((plane) => {
    const [from, to] = [first.move?.[plane] ?? 0, second.move?.[plane] ?? 0];
    const move = from + (to - from) * share;
    return {
      what: `predicted ${plane}`,
      working: `d + m(z) = ${put(station.deviation[plane], decimals)} + ${put(move, decimals)}`,
      here: station.deviation[plane] + move,
      answered: predicted.deviation[plane],
    };
  });
}

/** What the ideal move asks of each foot and side key, by the signs of the conventions. */
export function checkStacks({ sent, answered }: Part, decimals: number): Check[] {
  return answered.stacks.flatMap((stack) => {
    const support = sent.supports?.find(({ id }) => id === stack.support);
    const move = answered.moves.find(({ support: id }) => id === stack.support);
    if (support?.form !== "feet" || !move) return [];
    const side = (support.keys ?? "outside") === "outside" ? 1 : -1;
    const asked = { left: move.v, right: move.v, "key-left": side * move.h, "key-right": -side * move.h }[
      stack.place
    ];
    if (asked === undefined) return [];
    const plane = stack.place.startsWith("key") ? "h" : "v";
    const sign = asked === move[plane] ? "+" : "−";
    return [
      {
        what: `${stack.support}, ${stack.place}`,
        working: `${sign}${plane} = ${sign}${put(move[plane], decimals)}`,
        here: asked,
        answered: stack.ideal,
      },
    ];
  });
}
