import type { SelfTest } from "../../../../../shared/schemas/engine.ts";
import { DataTable, type DataColumn } from "../../../components/ui/data-table.tsx";
import { SectionHeading } from "../../../components/ui/section-heading.tsx";

type Figure = SelfTest["figures"][number];
/** A figure in its row, and whether the row before is of the same case. */
type Row = Figure & { readonly goesOn: boolean };

const areaWords: Record<Figure["area"], string> = {
  "bore-fit": "Bore fits",
  "axis-deviation": "Axis and deviations",
  "shim-move": "Shim moves",
  "cold-target": "Cold targets",
  "repeatability-study": "Repeatability",
  confirmation: "Confirmations",
  statistics: "Statistics",
};

/** Every published figure against what the engine gives now, area by area; within one those that failed come first. */
export function SelfTestTable({ figures }: { figures: readonly Figure[] }) {
  const areas = [...new Set(figures.map(({ area }) => area))];
  return areas.map((area) => {
    const own = figures.filter((figure) => figure.area === area);
    const failed = own.filter(({ passed }) => !passed);
    const ordered = [...failed, ...own.filter(({ passed }) => passed)];
    const rows = ordered.map((figure, index) => ({
      ...figure,
      goesOn: figure.id === ordered[index - 1]?.id,
    }));
    return (
      <section key={area}>
        <SectionHeading aside={<Tally passed={own.length - failed.length} failed={failed.length} />}>
          {areaWords[area]}
        </SectionHeading>
        <DataTable
          caption={areaWords[area]}
          columns={columns}
          rows={rows}
          rowKey={({ id, figure }) => `${id} ${figure}`}
        />
      </section>
    );
  });
}

export function Tally({ passed, failed }: { passed: number; failed: number }) {
  return (
    <span>
      {passed} passed,{" "}
      <span className={failed > 0 ? "font-semibold text-signal" : undefined}>{failed} failed</span>
    </span>
  );
}

const columns: DataColumn<Row>[] = [
  {
    heading: "case and source",
    lead: true,
    cell: ({ id, source, goesOn }) =>
      goesOn ? (
        <span className="wrap-anywhere text-muted">{id}</span>
      ) : (
        <>
          <span className="font-semibold wrap-anywhere">{id}</span>
          <span className="block max-w-prose text-xs wrap-anywhere text-muted">{source}</span>
        </>
      ),
  },
  { heading: "figure", cell: ({ figure }) => <span className="wrap-anywhere">{figure}</span> },
  { heading: "expected", align: "end", cell: ({ expected }) => <Written value={expected} /> },
  { heading: "got", align: "end", cell: (figure) => <Got {...figure} /> },
  { heading: "off by", align: "end", cell: (figure) => <Off {...figure} /> },
  {
    heading: "tolerance",
    align: "end",
    cell: ({ tolerance }) => <Small value={tolerance} />,
  },
  { heading: "outcome", cell: ({ passed }) => <Outcome passed={passed} /> },
];

function Written({ value }: { value: number }) {
  return <span className="whitespace-nowrap">{String(value).replaceAll("-", "\u2212")}</span>;
}

/** With two figures more than the tolerance tells apart, and no fewer than were printed. */
function Got({ got, expected, tolerance }: Pick<Figure, "got" | "expected" | "tolerance">) {
  if (got === null) return <span className="text-signal">no number</span>;
  const places = Math.ceil(-Math.log10(tolerance)) + 2;
  const told = Math.ceil(Math.log10(Math.abs(got) || 1)) + places;
  const printed = String(expected).replace(/e.*$/, "").replace(/\D/g, "").replace(/^0+/, "").length;
  return <Written value={Number(got.toPrecision(Math.min(17, Math.max(2, told, printed))))} />;
}

function Off({ got, expected }: Pick<Figure, "got" | "expected">) {
  if (got === null) return <span className="text-muted">–</span>;
  return <Small value={Math.abs(got - expected)} />;
}

/** Two figures with their power of ten, so that a difference is held against its tolerance at a glance. */
function Small({ value }: { value: number }) {
  return (
    <span className="whitespace-nowrap">
      {value === 0 ? "0" : value.toExponential(1).replace("-", "\u2212")}
    </span>
  );
}

function Outcome({ passed }: { passed: boolean }) {
  if (passed) return "passed";
  return (
    <span className="font-semibold text-signal">
      <span aria-hidden="true">× </span>failed
    </span>
  );
}
