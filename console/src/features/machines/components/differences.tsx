import type { MachineComparison } from "../../../../../shared/schemas/machines.ts";
import { writeJson } from "../../../lib/write-json.ts";

/** Every place where two revisions differ, named by id where it has one. */
export function Differences({
  comparison: { from, to, same, differences },
}: {
  comparison: MachineComparison;
}) {
  if (same) {
    return (
      <p>
        Revisions {from} and {to} hold the same document.
      </p>
    );
  }
  return (
    <div className="scroll-x overflow-x-auto" tabIndex={0} role="region" aria-label="Differences">
      <table className="w-full border-collapse text-[0.8125rem]">
        <caption className="pb-2 text-left font-semibold">
          {differences.length} {differences.length === 1 ? "difference" : "differences"}
        </caption>
        <thead>
          <tr className="border-y border-rule text-left">
            {["place", `revision ${from}`, `revision ${to}`].map((heading) => (
              <th key={heading} scope="col" className="px-2 py-1 font-normal">
                {heading}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {differences.map((difference) => (
            <tr key={difference.pointer} className="border-b border-hair align-top">
              <th scope="row" className="px-2 py-1 text-left font-normal break-all">
                <code>{difference.pointer}</code>
              </th>
              <Value value={difference.from} absent="not there" />
              <Value value={difference.to} absent="taken away" />
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function Value({ value, absent }: { value: unknown; absent: string }) {
  return (
    <td className="px-2 py-1">
      {value === undefined ? (
        <span className="text-muted">{absent}</span>
      ) : (
        <pre className="text-xs whitespace-pre-wrap">{writeJson(value, 40)}</pre>
      )}
    </td>
  );
}
