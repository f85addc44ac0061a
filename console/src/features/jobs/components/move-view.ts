import {
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../../../../../shared/figures/figure-table.ts";
import { decimalsAcross } from "../../../../../shared/figures/write-number.ts";
import { plannedBoreMoves } from "../../../../../shared/planned-move.ts";
import type { IndicationAnswer } from "../../../../../shared/schemas/indications.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";

export type JobPlan = JobRecord["plans"][number];
type Unit = JobRecord["machine"]["units"]["offset"];
type Vector = { readonly h: number; readonly v: number };

export interface WatchedNeighbour {
  readonly station: string;
  /** Null until it is read. */
  readonly change: Vector | null;
  readonly stopAt: { readonly h: readonly number[]; readonly v: readonly number[] };
  readonly passed: boolean;
}

/** How far one component has come, from all that was answered of it. */
export interface MoveView {
  /** The newest answer that says something of the component itself. */
  readonly latest: IndicationAnswer | null;
  /** Every neighbour as it was last read: a limit that was passed stays passed until the station is read again. */
  readonly neighbours: readonly WatchedNeighbour[];
  readonly stops: IndicationAnswer["stop"];
  /** Answers of this component, the newest first. */
  readonly answers: readonly IndicationAnswer[];
}

/** `answers` are the newest first, of any component and any plan. */
export function viewMove(answers: readonly IndicationAnswer[], plan: JobPlan, component: string): MoveView {
  const own = answers.filter((answer) => answer.plan === plan.id && answer.component === component);
  const latest = own.find(({ supports }) => supports.length > 0) ?? null;
  const read = new Map<string, IndicationAnswer["neighbours"][number]>();
  for (const { neighbours } of own) {
    for (const neighbour of neighbours)
      if (!read.has(neighbour.station)) read.set(neighbour.station, neighbour);
  }
  const watched = plan.result.steps.find((step) => step.component === component)?.watch ?? [];
  const unread = watched.filter(({ station }) => !read.has(station));
  const neighbours = [
    ...read.values(),
    ...unread.map(({ station, stopAt }) => ({ station, stopAt, change: null, passed: false })),
  ];
  return {
    latest,
    neighbours,
    stops: [
      ...own
        .flatMap(({ stop }) => stop)
        .filter(
          ({ code, station }, index, all) =>
            code === "neighbour_passed" &&
            read.get(station ?? "")?.passed === true &&
            all.findIndex((one) => one.code === code && one.station === station) === index,
        ),
      ...(latest?.stop ?? []).filter(({ code }) => code !== "neighbour_passed"),
    ],
    answers: own,
  };
}

/** What is left first: on a narrow screen it is what is seen without scrolling. */
export function tabulateLeft(
  { latest }: MoveView,
  plan: JobPlan,
  component: string,
  unit: Unit,
): FigureTable {
  const decimals = decimalsAcross(unit);
  const planned = plannedBoreMoves(plan.result.components.find(({ id }) => id === component));
  return {
    caption: "Left to move: + right, + up",
    columns: [
      textColumn("support"),
      ...["left h", "left v", "moved h", "moved v", "planned h", "planned v"].map((heading) =>
        numberColumn(heading, unit),
      ),
    ],
    rows: planned.map(({ support, h, v }) => {
      const now = latest?.supports.find((one) => one.support === support);
      const numbers = [now?.left.h, now?.left.v, now?.moved.h, now?.moved.v, h, v];
      return [textCell(support), ...numbers.map((value) => signedCell(value, decimals))];
    }),
  };
}

/** How far every neighbour has moved, and between which changes it may. Null where the plan watches none. */
export function tabulateNeighbours({ neighbours }: MoveView, unit: Unit): FigureTable | null {
  if (neighbours.length === 0) return null;
  const decimals = decimalsAcross(unit);
  const headings = ["moved h", "moved v", "least h", "most h", "least v", "most v"];
  return {
    caption: "Neighbours: how far they may move before the move is stopped",
    columns: [
      textColumn("station"),
      textColumn("state"),
      ...headings.map((heading) => numberColumn(heading, unit)),
    ],
    rows: neighbours.map(({ station, change, stopAt, passed }) => [
      textCell(station),
      textCell(change === null ? "not read" : passed ? "passed its limit" : "within"),
      ...[change?.h, change?.v, stopAt.h[0], stopAt.h[1], stopAt.v[0], stopAt.v[1]].map((value) =>
        signedCell(value, decimals),
      ),
    ]),
  };
}
