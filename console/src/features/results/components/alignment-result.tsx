import { predictedOf } from "../../../../../shared/figures/plan-elevation/plan-elevation-of-moves.ts";
import type {
  AlignmentRequest,
  AlignmentResult as Result,
} from "../../../../../shared/schemas/alignments.ts";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { AxisDeviationResult } from "./axis-deviation-result.tsx";
import { BoreFitResult } from "./bore-fit-result.tsx";
import { MoveSheet } from "./move-sheet.tsx";

interface AlignmentResultProps {
  request: AlignmentRequest;
  result: Result;
  /** Id of the bore whose section is shown. */
  chosen: string | null;
  onChoose: (id: string) => void;
}

/** The whole chain: where the stations lie and will lie, the moves, and the bores that it all began with. */
export function AlignmentResult({ request, result, chosen, onChoose }: AlignmentResultProps) {
  const { moves } = result;
  return (
    <div className="sheet-stack">
      <section>
        <SectionHeading>Axis and deviations</SectionHeading>
        <AxisDeviationResult
          call={request}
          result={result}
          {...(moves === null ? {} : { predicted: predictedOf(moves) })}
        />
      </section>
      {moves !== null && (
        <section>
          <SectionHeading>Moves</SectionHeading>
          <MoveSheet call={moveCallOf(request, result)} result={moves} />
        </section>
      )}
      <section>
        <SectionHeading>Bores</SectionHeading>
        <BoreFitResult request={request} fits={result.fits} chosen={chosen} onChoose={onChoose} />
      </section>
    </div>
  );
}

/** The moves' own call as the chain made it: from the deviations found. */
function moveCallOf(request: AlignmentRequest, result: Result) {
  const tolerances = new Map(request.stations.map(({ id, tolerance }) => [id, tolerance]));
  return {
    units: request.units,
    reference: result.axis.through,
    stations: result.stations.map(({ id, z, deviation }) => ({
      id,
      z,
      deviation,
      tolerance: tolerances.get(id),
    })),
  };
}
