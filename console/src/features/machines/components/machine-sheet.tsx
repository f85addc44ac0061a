import {
  tabulateMachineComponents,
  tabulateMachineStacks,
  tabulateMachineSupports,
} from "../../../../../shared/figures/machine/tabulate-machine-supports.ts";
import { tabulateStations } from "../../../../../shared/figures/machine/tabulate-stations.ts";
import {
  shimSentences,
  tabulateIndicators,
  tabulateStock,
} from "../../../../../shared/figures/machine/tabulate-stock.ts";
import type { MachineDocument } from "../../../../../shared/schemas/machines.ts";
import { JsonView } from "../../../components/ui/json-view.tsx";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";
import { Tables } from "../../results/components/tables.tsx";
import { MakerCautions } from "./maker-cautions.tsx";

/** A machine's document as tables: what its maker warns of first, then bores, parts, supports, shims. */
export function MachineSheet({ document }: { document: MachineDocument }) {
  const sentences = shimSentences(document);
  return (
    <div className="sheet-stack">
      <MakerCautions cautions={document.cautions ?? []} />
      <section aria-label="Bores" className="sheet-stack">
        <SectionHeading>Bores</SectionHeading>
        <p className="max-w-prose text-muted">z increases downstream: {document.downstream}</p>
        <NumberTable table={tabulateStations(document)} />
      </section>
      <section aria-label="Parts and supports" className="sheet-stack">
        <SectionHeading>Parts and supports</SectionHeading>
        {(document.components ?? []).length === 0 && (
          <p className="text-muted">None are described: moves cannot be planned.</p>
        )}
        <Tables
          tables={[
            tabulateMachineComponents(document),
            tabulateMachineSupports(document),
            tabulateMachineStacks(document),
            tabulateIndicators(document),
          ]}
        />
      </section>
      <section aria-label="Shims" className="sheet-stack">
        <SectionHeading>Shims</SectionHeading>
        {sentences.length > 0 && <p className="max-w-prose">{sentences.join(" ")}</p>}
        <Tables tables={[tabulateStock(document)]} />
        {sentences.length === 0 && (document.shims?.stock ?? []).length === 0 && (
          <p className="text-muted">None are listed.</p>
        )}
      </section>
      {document.remarks && <p className="max-w-prose whitespace-pre-line">{document.remarks}</p>}
      <JsonView title="Document" value={document} />
    </div>
  );
}
