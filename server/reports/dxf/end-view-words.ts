import { writeNumber } from "../../../shared/figures/write-number.ts";
import type { DrawnMachine, DrawnStation } from "./drawn-machine.ts";
import { linesIn } from "./drawing.ts";

/** Decimals of a deviation: a tenth of a micrometre. */
const decimals = 4;

/** What stands over a station's end view, and under it: how far off each survey found it, and its verdict in words. */
export function endViewWords(
  { surveys }: DrawnMachine,
  { id }: DrawnStation,
  width: number,
  letter: number,
): { readonly name: readonly string[]; readonly under: readonly string[] } {
  const wrap = (text: string) => linesIn(width, letter, text);
  const measured = surveys.flatMap(({ name, bores }) =>
    bores.filter(({ station }) => station.id === id).map((bore) => ({ name, bore })),
  );
  const isReference = measured.at(-1)?.bore.reference === true;
  return {
    name: wrap(isReference ? `${id} (ref.)` : id),
    under: measured.flatMap(({ name, bore: { deviationMm, verdict, concession } }) => [
      ...wrap(
        `${name} ${writeNumber(Math.hypot(deviationMm.h, deviationMm.v), decimals)} mm ${verdict ?? "not judged"}`,
      ),
      ...(concession === null ? [] : wrap(`conceded by ${concession}`)),
    ]),
  };
}
