import { decimalsAcross, writeSigned } from "../../../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { Disclosure } from "../../../components/ui/disclosure.tsx";
import { Instant } from "../../../components/ui/instant.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { Flags } from "./flags.tsx";
import { authorName } from "./job-words.ts";
import { LogMove } from "./log-move.tsx";
import { Withdraw } from "./withdraw.tsx";

type Move = JobRecord["moves"][number];

/** What was moved, in the order in which it was logged. */
export function Moves({ record, mayAct }: { record: JobRecord; mayAct: boolean }) {
  const { units, components = [] } = record.machine;
  return (
    <section id="moves" aria-label="Moves" className="sheet-stack">
      <SectionHeading>Moves</SectionHeading>
      <Flags flags={record.moves.flatMap(({ flags }) => flags)} title="Flags of the moves" />
      {record.moves.length === 0 ? (
        <p className="text-muted">Nothing has been moved.</p>
      ) : (
        <DataTable
          caption="Moves, in the order logged"
          columns={[...columnsIn(units.offset), ...(mayAct ? [withdrawColumn(record.id)] : [])]}
          rows={record.moves}
          rowKey={({ id }) => id}
        />
      )}
      {mayAct && components.length > 0 && (
        <Disclosure title="Log a move">
          <LogMove record={record} />
        </Disclosure>
      )}
    </section>
  );
}

function columnsIn(unit: JobRecord["machine"]["units"]["offset"]): DataColumn<Move>[] {
  const write = (value: number): string => writeSigned(value, decimalsAcross(unit));
  return [
    {
      heading: "component",
      lead: true,
      cell: (move) => <span className="font-semibold">{move.component}</span>,
    },
    { heading: "moved at", cell: (move) => <Instant at={move.at} /> },
    { heading: "by", cell: (move) => move.person ?? authorName(move.author) },
    {
      heading: `moved, ${unit}`,
      cell: (move) =>
        (move.moved ?? []).length === 0 ? (
          <span className="text-muted">not stated</span>
        ) : (
          <ul>
            {(move.moved ?? []).map(({ support, h, v }) => (
              <li key={support}>
                {support}: h {write(h)}, v {write(v)}
              </li>
            ))}
          </ul>
        ),
    },
    {
      heading: "state",
      cell: (move) =>
        move.finished ? "finished, locked" : <span className="text-signal">not finished</span>,
    },
    { heading: "reason", cell: (move) => move.reason ?? null },
  ];
}

const withdrawColumn = (job: string): DataColumn<Move> => ({
  heading: "action",
  align: "end",
  cell: (move) => <Withdraw job={job} entry={move.id} what={`move of ${move.component}`} />,
});
