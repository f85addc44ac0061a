import { boreSectionOf } from "../../../../../shared/figures/bore-section/bore-section-of.ts";
import { drawBoreSection } from "../../../../../shared/figures/bore-section/draw-bore-section.ts";
import { tabulateBoreFits } from "../../../../../shared/figures/bore-section/tabulate-bore-fits.ts";
import { tabulateBoreSection } from "../../../../../shared/figures/bore-section/tabulate-bore-section.ts";
import { tabulateTrials } from "../../../../../shared/figures/trials/tabulate-trials.ts";
import type { BoreFitRequest, BoreFitResult as Fit } from "../../../../../shared/schemas/bore-fits.ts";
import { FigureView } from "../../../components/ui/figure-view.tsx";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { BoreChoice } from "./bore-choice.tsx";
import { Tables } from "./tables.tsx";
import { Warnings, type PlacedWarning } from "./warnings.tsx";

interface BoreFitResultProps {
  request: Pick<BoreFitRequest, "units" | "seen" | "bores">;
  fits: readonly Fit[];
  /** Id of the bore whose section is shown; the first when it names none. */
  chosen: string | null;
  onChoose: (id: string) => void;
}

/** Figure 1 for a chosen bore with its readings beside it, then all bores of the call. */
export function BoreFitResult({ request, fits, chosen, onChoose }: BoreFitResultProps) {
  const found = fits.findIndex((fit) => fit.id === chosen);
  const index = Math.max(0, found);
  const fit = fits[index];
  const bore = request.bores[index];
  if (!fit || !bore) return null;
  const model = boreSectionOf(bore, fit, request.units, request.seen);
  return (
    <div className="sheet-stack">
      {fits.length > 1 && <BoreChoice ids={fits.map(({ id }) => id)} index={index} onChoose={onChoose} />}
      {model === null ? (
        <p className="text-muted">
          Readings of this form are not wall points, so there is no bore section to draw.
        </p>
      ) : (
        <div className="sheet-stack items-start lg:grid-cols-[minmax(0,38rem)_minmax(0,1fr)]">
          <FigureView number={1} printWidthMm={130} draw={(width) => drawBoreSection(model, width)} />
          <NumberTable key={model.id} table={tabulateBoreSection(model)} />
        </div>
      )}
      <NumberTable table={tabulateBoreFits(fits, request.units)} />
      <Tables tables={[tabulateTrials(fits, request.units, "bore")]} />
      <Warnings warnings={fits.flatMap(warningsOf)} />
    </div>
  );
}

function warningsOf(fit: Fit): PlacedWarning[] {
  const ofTrials = fit.monteCarlo?.warnings ?? [];
  return [...fit.warnings, ...ofTrials].map((warning) => ({ where: fit.id, ...warning }));
}
