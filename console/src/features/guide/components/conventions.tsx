import { furtherUnitChoices, unitChoices } from "../../../../../shared/units.ts";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { FigureView } from "../../../components/ui/figure-view.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import {
  deviationSays,
  numberSays,
  sectionSays,
  shimSays,
  unitUses,
  zSays,
  type UnitUse,
} from "../content/conventions.ts";
import { drawCrossSection } from "../drawings/draw-cross-section.ts";
import { drawDeviation } from "../drawings/draw-deviation.ts";
import { drawMachine } from "../drawings/draw-machine.ts";
import { drawRoll } from "../drawings/draw-roll.ts";
import { drawShimSigns } from "../drawings/draw-shim-signs.ts";
import { Sentences } from "./sentences.tsx";

/** Every convention that a number obeys, drawn. */
export function Conventions() {
  return (
    <>
      <section>
        <SectionHeading>Along the machine: z</SectionHeading>
        <div className="sheet-stack">
          <Sentences lines={zSays} />
          <FigureView number={1} draw={drawMachine} />
        </div>
      </section>
      <section>
        <SectionHeading>Across it: h, v and the clock</SectionHeading>
        <div className="sheet-stack">
          <Sentences lines={sectionSays} />
          <FigureView number={2} draw={drawCrossSection} />
        </div>
      </section>
      <section>
        <SectionHeading>Deviations</SectionHeading>
        <div className="sheet-stack">
          <Sentences lines={deviationSays} />
          <FigureView number={3} draw={drawDeviation} />
        </div>
      </section>
      <section>
        <SectionHeading>Units and numbers</SectionHeading>
        <div className="sheet-stack">
          <Units />
          <Sentences lines={numberSays} />
        </div>
      </section>
      <section>
        <SectionHeading>Shims, roll and indicators</SectionHeading>
        <div className="sheet-stack">
          <Sentences lines={shimSays} />
          <FigureView number={4} draw={drawShimSigns} />
          <FigureView number={5} draw={drawRoll} />
        </div>
      </section>
    </>
  );
}

const choices: Readonly<Record<string, readonly string[]>> = { ...unitChoices, ...furtherUnitChoices };

const columns: DataColumn<UnitUse>[] = [
  { heading: "member of units", lead: true, cell: ({ dimension }) => <code>{dimension}</code> },
  { heading: "one of", cell: ({ dimension }) => (choices[dimension] ?? []).join(", ") },
  { heading: "used for", cell: ({ used }) => <span className="block max-w-prose">{used}</span> },
];

/** The units that a call may state, as the service itself takes them. */
function Units() {
  return (
    <DataTable
      caption="Units of a call"
      columns={columns}
      rows={unitUses}
      rowKey={({ dimension }) => dimension}
    />
  );
}
