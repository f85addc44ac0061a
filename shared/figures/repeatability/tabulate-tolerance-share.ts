import type { RepeatabilityStudyResult } from "../../schemas/repeatability-studies.ts";
import { numberCell, numberColumn, textCell, textColumn, type FigureTable } from "../figure-table.ts";

type Share = { readonly h: number; readonly v: number } | { readonly radial: number };

/** How much of the tolerance six standard deviations take; null where no tolerance was sent. */
export function tabulateToleranceShare(result: RepeatabilityStudyResult): FigureTable | null {
  const shares = sharesOf(result);
  const [first] = shares;
  if (!first) return null;
  const isRound = "radial" in first.share;
  return {
    caption: "Six standard deviations, of the tolerance's width",
    columns: [
      textColumn("scatter of"),
      ...(isRound
        ? [numberColumn("worst direction", "%")]
        : [numberColumn("h", "%"), numberColumn("v", "%")]),
    ],
    rows: shares.map(({ name, share }) => [
      textCell(name),
      ...("radial" in share
        ? [numberCell(share.radial, 1)]
        : [numberCell(share.h, 1), numberCell(share.v, 1)]),
    ]),
  };
}

function sharesOf(result: RepeatabilityStudyResult): { readonly name: string; readonly share: Share }[] {
  if (result.percentOfTolerance === null) return [];
  if (result.form === "one_station") return [{ name: "one reading", share: result.percentOfTolerance }];
  const { repeatability, reproducibility, reading } = result.percentOfTolerance;
  return [
    { name: "repeatability", share: repeatability },
    { name: "reproducibility", share: reproducibility },
    { name: "one reading by anybody", share: reading },
  ];
}
