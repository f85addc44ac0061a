import { flagSentences } from "../../../../shared/figures/job/with-notes.ts";
import type { JobRecord } from "../../../../shared/schemas/jobs.ts";
import { dateOf, draftMark, type ReportContext } from "../../report-format.ts";
import { axisWords, ownerOf, verdictWords } from "../../report-words.ts";
import {
  headingBlock,
  listBlock,
  tableBlocks,
  textBlock,
  type Block,
  type Section,
} from "../layout/blocks.ts";
import { reportType } from "../paint/title-fields.ts";
import {
  tabulateAcceptances,
  tabulateConcessions,
  tabulateInstruments,
  tabulatePeople,
  tabulateVerdicts,
} from "../../tables/job-tables.ts";
import { writeMoment, writeSpan } from "../../tables/write-moment.ts";

/** The first sheet: what the record is of, who made it, what it came to, and what must be known before it is used. */
export function coverSection(record: JobRecord, context: ReportContext): Section {
  return {
    title: reportType,
    columns: 2,
    blocks: [
      headingBlock("Identification"),
      { kind: "fields", fields: identification(record, context) },
      ...tableBlocks(tabulatePeople(record)),
      ...tableBlocks(tabulateInstruments(record)),
      { kind: "break" },
      ...verdicts(record),
      headingBlock("Cautions"),
      listBlock(record.cautions.map(({ code, text }) => (code === "maker" ? `Of the maker: ${text}` : text))),
      ...tableBlocks(tabulateConcessions(record)),
      ...tableBlocks(tabulateAcceptances(record)),
      ...signOff(record),
      ...flags(record),
    ],
  };
}

function identification(record: JobRecord, { engineVersion, recordHash }: ReportContext): [string, string][] {
  const { details, machine } = record;
  return [
    ["Job", record.title],
    ["Job id, revision", `${record.id}, ${record.revision}`],
    ["Machine", machine.name],
    ["Plant tag", machine.plantTag ?? "not stated"],
    ["Legal owner", ownerOf(record) ?? "not stated"],
    ["Site", details.site ?? "not stated"],
    ["Order number", details.orderNumber ?? "not stated"],
    ["Dates of the job", writeSpan(details.startsOn, details.endsOn)],
    ["Record as of", `${writeMoment(dateOf(record).toISOString())} UTC`],
    ["Downstream", machine.downstream],
    ["Read looking", `${details.seen}, unless a reading says otherwise`],
    ["Axis", axisWords(record)],
    ["Verdict rule", verdictWords(record)],
    ["Units", `z ${machine.units.axial}, bores ${machine.units.bore}, offsets ${machine.units.offset}`],
    ["Engine version", engineVersion],
    ["Record sha256", bareHash(recordHash)],
    ["Machine revision", String(record.machineRevision)],
    ["Machine sha256", bareHash(record.machineHash)],
  ];
}

const bareHash = (hash: string): string => hash.replace(/^sha256:/, "");

function verdicts(record: JobRecord): Block[] {
  const blocks = tableBlocks(tabulateVerdicts(record));
  return blocks.length > 0
    ? blocks
    : [
        headingBlock("Verdicts"),
        textBlock("No survey has been computed: this record holds no verdict.", "signal"),
      ];
}

function flags(record: JobRecord): Block[] {
  const sentences = flagSentences(record.flags);
  if (sentences.length === 0)
    return [headingBlock("Flags"), textBlock("None: nothing in the log asks for one.")];
  return [headingBlock(`Flags: ${sentences.length}`), listBlock(sentences, "signal")];
}

function signOff({ signature, signOff: { ready, obstacles } }: JobRecord): Block[] {
  if (signature) {
    return [
      headingBlock("Signature"),
      {
        kind: "fields",
        fields: [
          ["Signed by", signature.name],
          ["At", `${writeMoment(signature.createdAt)} UTC`],
          ["Meaning", signature.meaning],
          ["Signed sha256", bareHash(signature.recordHash)],
        ],
      },
    ];
  }
  return [
    headingBlock("Sign-off"),
    textBlock(`${draftMark}.${ready ? " Nothing stands in the way of a signature." : ""}`, "signal"),
    ...(ready ? [] : [textBlock("Still open:"), listBlock(flagSentences(obstacles), "signal")]),
  ];
}
