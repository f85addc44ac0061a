import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { decimalsAcross } from "../../../shared/figures/write-number.ts";
import {
  fixed,
  headingCell,
  numberCell,
  textCell,
  titleCell,
  type SheetCell,
} from "../../spreadsheets/cell.ts";
import type { Sheet } from "../../spreadsheets/sheet.ts";
import { numberedName, reportedSurveys } from "../found-and-left.ts";
import type { ReportContext } from "../report-format.ts";
import { lineUnderTitle } from "./section.ts";
import { authorName, creatorOf, ownerOf, signatureWords, verdictWords } from "../report-words.ts";

const wrapped = { wrap: true, alignVertical: "top" } as const;

/** What the record is, who stands for it, and what a reader must know first. */
export function summarySheet(record: JobRecord, context: ReportContext): Sheet {
  const rows: SheetCell[][] = [
    [titleCell("Bore alignment record")],
    lineUnderTitle(signatureWords(record), { fontWeight: "bold" }),
    [],
    ...identification(record, context),
    [],
    ...outcome(record),
    ...(record.flags.length === 0 ? [[], [headingCell("Flags"), textCell("none")]] : []),
    ...list("Flags", said(record.flags), ({ detail, station }) => [station, detail]),
    ...list(
      "What stands in the way of a signature",
      said(record.signOff.obstacles),
      ({ detail, station }) => [station, detail],
    ),
    ...list("Concessions", record.concessions, ({ station, name, reason }) => [
      station,
      `${name}: ${reason}`,
    ]),
    ...list("Axis taken as new", record.axisAcceptances, ({ name, reason }) => [name, reason]),
    ...list("Cautions", record.cautions, ({ code, text }) => [code.replaceAll("_", " "), text]),
    ...list("Comments", record.comments, ({ author, createdAt, text }) => [
      `${authorName(author)}, ${createdAt.slice(0, 10)}`,
      text,
    ]),
    ...list("Attachments", record.attachments, ({ name, caption, sha256 }) => [
      name,
      [caption, sha256].filter(Boolean).join(" "),
    ]),
  ];
  return { name: "Summary", rows, widths: [34, 110] };
}

function identification(record: JobRecord, { engineVersion, recordHash }: ReportContext): SheetCell[][] {
  const { details, machine, signature } = record;
  const { axial, bore, offset } = machine.units;
  const dates = [details.startsOn, details.endsOn].filter(Boolean).join(" to ");
  const lines: readonly (readonly [string, string | null | undefined])[] = [
    ["Machine", machine.name],
    ["Plant tag", machine.plantTag],
    ["Legal owner", ownerOf(record)],
    ["Site", details.site],
    ["Job", record.title],
    ["Order", details.orderNumber],
    ["Dates", dates],
    ["Identification number", record.id],
    ["Revision", `${record.revision}${revisionReason(record)}`],
    ["Creator", creatorOf(record)],
    ["Approval person", signature?.name],
    ["Date of issue", signature?.createdAt.slice(0, 10)],
    ["Meaning of the signature", signature?.meaning],
    ["People", (details.people ?? []).map(({ name, role }) => `${name} (${role})`).join("\n")],
    ["Downstream, where z increases", machine.downstream],
    ["Units", `z in ${axial}; diameters in ${bore}; everything else in ${offset}`],
    ["View", "h to the right and v up, seen looking downstream; clock angles clockwise from up."],
    ["Verdicts", verdictWords(record)],
    ["Machine revision", `${record.machineRevision}, document ${record.machineHash}`],
    ["Record hash", recordHash],
    ["Engine version", engineVersion],
    ["Remarks", details.remarks],
  ];
  return lines
    .filter(([, value]) => value)
    .map(([name, value]) => [headingCell(name), textCell(value, wrapped)]);
}

function revisionReason({ revision, revisions }: JobRecord): string {
  const reason = revisions.find((one) => one.revision === revision)?.reason;
  return reason ? `: ${reason}` : "";
}

function outcome(record: JobRecord): SheetCell[][] {
  const format = fixed(decimalsAcross(record.machine.units.offset));
  const { found, others, left } = reportedSurveys(record);
  const all = [
    ["As found", found] as const,
    ...others.map((survey) => [numberedName(survey), survey] as const),
    ["As left", left] as const,
  ];
  return all.flatMap(([words, computed]) => {
    if (!computed) return [[headingCell(words), textCell("Not computed.")]];
    const { conforms, undecided, exceeds, worst } = computed.result.summary;
    const worstWords = worst ? `; worst ${worst.id}` : "";
    const { drift } = computed.result;
    return [
      [
        headingCell(words),
        textCell(`${conforms} conform, ${undecided} undecided, ${exceeds} exceed${worstWords}`),
      ],
      ...(drift
        ? [
            [
              headingCell(`Drift at ${drift.station}, h (${record.machine.units.offset})`),
              leftNumber(drift.h, format),
            ],
            [
              headingCell(`Drift at ${drift.station}, v (${record.machine.units.offset})`),
              leftNumber(drift.v, format),
            ],
          ]
        : []),
      ...(computed.result.current
        ? []
        : [[headingCell(""), textCell("Readings have changed since this was computed.")]]),
    ];
  });
}

const leftNumber = (value: number, format: string) => numberCell(value, format, { align: "left" });

function list<Item>(
  heading: string,
  items: readonly Item[],
  line: (item: Item) => readonly [string | null, string],
): SheetCell[][] {
  if (items.length === 0) return [];
  return [
    [],
    [textCell(heading, { fontWeight: "bold" })],
    ...items.map((item) => {
      const [name, words] = line(item);
      return [textCell(name, wrapped), textCell(words, wrapped)];
    }),
  ];
}

/** Each once, however many surveys bear it. */
function said(flags: JobRecord["flags"]): JobRecord["flags"] {
  return [...new Map(flags.map((flag) => [`${flag.station} ${flag.detail}`, flag])).values()];
}
