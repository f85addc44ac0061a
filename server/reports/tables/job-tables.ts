import {
  numberCell,
  numberColumn,
  textCell,
  textColumn,
  type FigureTable,
} from "../../../shared/figures/figure-table.ts";
import { computedSurveys } from "../../../shared/figures/job/compared-surveys.ts";
import { decimalsAcross } from "../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { authorName } from "../report-words.ts";
import { writeMoment } from "./write-moment.ts";

export function tabulatePeople({ details }: JobRecord): FigureTable {
  return {
    caption: "People",
    columns: [textColumn("name"), textColumn("role")],
    rows: (details.people ?? []).map(({ name, role }) => [textCell(name), textCell(role)]),
  };
}

export function tabulateInstruments({ details, machine }: JobRecord): FigureTable {
  const { offset } = machine.units;
  return {
    caption: "Instruments",
    columns: [
      textColumn("id"),
      textColumn("instrument"),
      textColumn("calibrated"),
      textColumn("due"),
      numberColumn("u of a reading", `${offset}, k = 1`),
    ],
    rows: (details.instruments ?? []).map((instrument) => [
      textCell(instrument.id),
      textCell(instrument.description),
      textCell(instrument.calibratedOn ?? "\u2013"),
      textCell(instrument.calibrationDueOn ?? "\u2013"),
      numberCell(instrument.readingUncertainty, decimalsAcross(offset)),
    ]),
  };
}

/** What the surveys came to, one row each. */
export function tabulateVerdicts(record: JobRecord): FigureTable {
  return {
    caption: "Verdicts",
    columns: [
      textColumn("survey"),
      numberColumn("stations", null),
      numberColumn("conform", null),
      numberColumn("undecided", null),
      numberColumn("exceed", null),
      textColumn("worst"),
      numberColumn("of its tolerance", "%"),
    ],
    rows: computedSurveys(record).map(({ name, result: { stations, summary } }) => [
      textCell(name),
      numberCell(stations.length, 0),
      numberCell(summary.conforms, 0),
      numberCell(summary.undecided, 0),
      numberCell(summary.exceeds, 0),
      textCell(summary.worst?.id ?? "\u2013"),
      numberCell(summary.worst ? summary.worst.ratio * 100 : null, 0),
    ]),
  };
}

export function tabulateConcessions({ concessions }: JobRecord): FigureTable {
  return {
    caption: "Concessions",
    columns: [
      textColumn("station"),
      textColumn("granted by"),
      textColumn("reason"),
      textColumn("entered, UTC"),
    ],
    rows: concessions.map(({ station, name, reason, createdAt }) => [
      textCell(station),
      textCell(name),
      textCell(reason),
      textCell(writeMoment(createdAt)),
    ]),
  };
}

export function tabulateAcceptances({ axisAcceptances, surveys }: JobRecord): FigureTable {
  return {
    caption: "New axes, accepted by name",
    columns: [
      textColumn("survey"),
      textColumn("accepted by"),
      textColumn("reason"),
      textColumn("entered, UTC"),
    ],
    rows: axisAcceptances.map(({ survey, name, reason, createdAt, current }) => [
      textCell(
        `survey ${surveys.findIndex(({ id }) => id === survey) + 1}${current ? "" : ", computed again since"}`,
      ),
      textCell(name),
      textCell(reason),
      textCell(writeMoment(createdAt)),
    ]),
  };
}

export function tabulateComments({ comments }: JobRecord): FigureTable {
  return {
    caption: "Comments",
    columns: [textColumn("entered, UTC"), textColumn("by"), textColumn("comment")],
    rows: comments.map(({ createdAt, author, text }) => [
      textCell(writeMoment(createdAt)),
      textCell(authorName(author)),
      textCell(text),
    ]),
  };
}

export function tabulateAttachments({ attachments }: JobRecord): FigureTable {
  return {
    caption: "Attachments",
    columns: [
      textColumn("name"),
      textColumn("caption"),
      textColumn("type"),
      numberColumn("size", "bytes"),
      textColumn("sha256"),
      textColumn("added, UTC"),
      textColumn("by"),
    ],
    rows: attachments.map(({ name, caption, mediaType, bytes, sha256, createdAt, author }) => [
      textCell(name),
      textCell(caption ?? "\u2013"),
      textCell(mediaType),
      numberCell(bytes, 0),
      textCell(sha256.replace(/^sha256:/, "")),
      textCell(writeMoment(createdAt)),
      textCell(authorName(author)),
    ]),
  };
}

export function tabulateRevisions({ revisions }: JobRecord): FigureTable {
  return {
    caption: "Revisions of the job",
    columns: [numberColumn("revision", null), textColumn("signed, UTC"), textColumn("reason")],
    rows: revisions.map(({ revision, signedAt, reason }) => [
      numberCell(revision, 0),
      textCell(signedAt ? writeMoment(signedAt) : "not signed"),
      textCell(reason ?? (revision === 1 ? "first" : "\u2013")),
    ]),
  };
}
