import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../../../shared/figures/figure-table.ts";
import { decimalsAcross, decimalsFor } from "../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import type { ShimMoveResult } from "../../../shared/schemas/shim-moves.ts";
import { writeMoment } from "./write-moment.ts";

/** What was moved as it was logged: a row a support, with the move's flags and the reason given. */
export function tabulateLoggedMoves({ moves, machine }: JobRecord): FigureTable {
  const { offset } = machine.units;
  const decimals = decimalsFor(
    moves.flatMap(({ moved }) => (moved ?? []).flatMap(({ h, v }) => [h, v])),
    decimalsAcross(offset),
  );
  return {
    caption: "Moves as logged",
    columns: [
      textColumn("moved at, UTC"),
      textColumn("component"),
      textColumn("by"),
      textColumn("finished"),
      textColumn("support"),
      numberColumn("moved h", offset),
      numberColumn("moved v", offset),
      textColumn("flags"),
      textColumn("reason"),
    ],
    rows: moves.flatMap(({ at, component, person, finished, moved = [], flags, reason }) => {
      const lines = moved.length === 0 ? [undefined] : moved;
      return lines.map((one, index) => [
        ...(index === 0
          ? [
              textCell(writeMoment(at)),
              textCell(component),
              textCell(person ?? "\u2013"),
              textCell(finished ? "yes" : "no"),
            ]
          : [textCell(""), textCell(""), textCell(""), textCell("")]),
        textCell(one?.support ?? "not read"),
        signedCell(one?.h, decimals),
        signedCell(one?.v, decimals),
        textCell(
          index > 0 ? "" : flags.map(({ code, detail }) => `${code}: ${detail}`).join("\n") || "\u2013",
        ),
        textCell(index > 0 ? "" : (reason ?? "\u2013")),
      ]);
    }),
  };
}

/** What a plan cannot bring inside, and what its reader should know. */
export function tabulateAdvice({ components, advice }: ShimMoveResult): FigureTable {
  return {
    caption: "What the plan says of itself",
    columns: [textColumn("about"), textColumn("says")],
    rows: [
      ...components.flatMap(({ id, unreachable }) =>
        unreachable
          ? [[textCell(id), textCell(`not all inside (${unreachable.cause}): ${unreachable.reason}`)]]
          : [],
      ),
      ...advice.map(({ code, detail }) => [textCell(code), textCell(detail)]),
    ],
  };
}

/** The order of the steps, each with its number of parts. */
export function tabulateOrder({ steps }: ShimMoveResult): FigureTable {
  return {
    caption: "Order of the steps",
    columns: [numberColumn("step", null), textColumn("component"), numberColumn("parts", null)],
    rows: steps.map(({ order, component, increments }) => [
      numberCell(order, 0),
      textCell(component),
      numberCell(increments.length, 0),
    ]),
  };
}
