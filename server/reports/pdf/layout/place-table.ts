import type { FigureTable } from "../../../../shared/figures/figure-table.ts";
import type { SheetFlow } from "./sheet-flow.ts";
import {
  headHeightOf,
  layOutTable,
  lineHeightOf,
  rowHeightOf,
  type LaidRow,
  type LaidTable,
} from "./lay-out-table.ts";
import { paragraphGap } from "./text-metrics.ts";

/** What stays together, a short table or the rows of a station, takes at most this share of a column. */
const largestGroup = 0.45;

/** Puts a table down the columns; where it goes on, its head is repeated. */
export function placeTable(flow: SheetFlow, table: FigureTable): void {
  for (const laid of layOutTable(table, flow.width)) {
    placeLaid(flow, laid);
    flow.skip(paragraphGap * 2);
  }
}

function placeLaid(flow: SheetFlow, table: LaidTable): void {
  const head = headHeightOf(table);
  const most = (flow.height - head) * largestGroup;
  let continued = false;
  let groups = groupsOf(table, most);
  const whole = groups.reduce((total, { height }) => total + height, 0);
  if (whole <= most) flow.keep(head + whole);
  while (groups.length > 0) {
    flow.keep(head + (groups[0]?.height ?? 0));
    const rows: LaidRow[] = [];
    let used = head;
    for (const group of groups) {
      if (used + group.height > flow.left + 1e-6 && rows.length > 0) break;
      rows.push(...group.rows);
      used += group.height;
    }
    const isContinued = continued;
    flow.put(used, (x, y) => ({ kind: "table", x, y, table, rows, continued: isContinued }));
    groups = groups.slice(countGroups(groups, rows.length));
    continued = true;
    if (groups.length > 0) flow.next();
  }
}

interface Group {
  readonly rows: readonly LaidRow[];
  readonly height: number;
}

const countGroups = (groups: readonly Group[], rows: number): number => {
  let left = rows;
  return groups.filter((group) => {
    left -= group.rows.length;
    return left >= 0;
  }).length;
};

/** Rows that stay together: those of one station, unless they take more than they may. */
function groupsOf({ rows, letters }: LaidTable, most: number): Group[] {
  const groups: LaidRow[][] = [];
  for (const row of rows.flatMap((one) => cutRow(one, letters, most))) {
    const last = groups.at(-1);
    const height = heightOf([...(last ?? []), row], letters);
    if (last && row.joined && height <= most) last.push(row);
    else groups.push([row]);
  }
  return groups.map((group) => ({ rows: group, height: heightOf(group, letters) }));
}

function heightOf(rows: readonly LaidRow[], letters: number): number {
  return rows.reduce((total, { lines }) => total + rowHeightOf(lines, letters), 0);
}

/** A row taller than `most`, in pieces that are not. */
function cutRow(row: LaidRow, letters: number, most: number): LaidRow[] {
  const room = Math.max(1, Math.floor(most / lineHeightOf(letters)) - 1);
  if (row.lines <= room) return [row];
  return Array.from({ length: Math.ceil(row.lines / room) }, (_, piece) => {
    const cells = row.cells.map(({ lines, verdict }) => ({
      lines: lines.slice(piece * room, (piece + 1) * room),
      verdict: piece === 0 ? verdict : null,
    }));
    return {
      cells,
      lines: Math.max(1, ...cells.map(({ lines }) => lines.length)),
      joined: piece > 0 || row.joined,
    };
  });
}
