import { Button } from "../../../components/ui/button.tsx";
import { Failure } from "../../../components/ui/failure.tsx";
import type { Replay as ReplayAnswer } from "../../../../../shared/schemas/calculations.ts";
import { useReplay } from "../api/replay-calculation.ts";

/** Would the stored call come out the same today? */
export function Replay({ id }: { id: string }) {
  const replay = useReplay(id);
  return (
    <div className="grid justify-items-start gap-3">
      <p className="max-w-prose text-muted">
        Computes the stored call again with today's engine and compares every number with what is stored. The
        record stays as it is.
      </p>
      <Button busy={replay.isPending} onClick={() => replay.mutate()}>
        Replay record
      </Button>
      <div role="status" className="w-full">
        {replay.isSuccess && <Outcome answer={replay.data} />}
      </div>
      {replay.isError && <Failure error={replay.error} what="The record could not be replayed." />}
    </div>
  );
}

function Outcome({ answer }: { answer: ReplayAnswer }) {
  const engines =
    answer.engineVersion === answer.recordedEngineVersion
      ? `Engine ${answer.engineVersion}`
      : `Engine ${answer.engineVersion} today, ${answer.recordedEngineVersion} then`;
  if (answer.same) {
    return (
      <p>
        <strong className="font-semibold">same</strong>: {engines} answers exactly what is stored, to the last
        digit.
      </p>
    );
  }
  return (
    <div>
      <p className="mb-2">
        <strong className="font-semibold text-signal">differs</strong> at {answer.differences.length}{" "}
        {answer.differences.length === 1 ? "place" : "places"}. {engines}.
      </p>
      <div className="scroll-x overflow-x-auto" tabIndex={0} role="region" aria-label="Differences">
        <table className="w-full border-collapse text-[0.8125rem]">
          <thead>
            <tr className="border-y border-rule text-left">
              {["place", "then", "now"].map((heading) => (
                <th key={heading} scope="col" className="px-2 py-1 font-normal">
                  {heading}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {answer.differences.map((difference) => (
              <tr key={difference.pointer} className="border-b border-hair align-top">
                <th scope="row" className="px-2 py-1 text-left font-normal">
                  {difference.pointer}
                </th>
                <td className="px-2 py-1">{JSON.stringify(difference.then)}</td>
                <td className="px-2 py-1">{JSON.stringify(difference.now)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </div>
  );
}
