import { jobRecord, jobSummary, type JobRecord, type JobSummary } from "../../../shared/schemas/jobs.ts";
import {
  machineSchema,
  machineSummary,
  type Machine,
  type MachineSummary,
} from "../../../shared/schemas/machines.ts";
import { setUpChecks } from "../../../shared/set-up-checks.ts";
import { axisRequest, moveRequest, sampleResponse } from "./sample-records.ts";
import { sampleId } from "./samples.ts";

const at = "2026-11-04T06:30:00.000Z";
const author = { member: { id: sampleId(10), name: "Ines Alder" }, key: null };
const entry = (number: number) => ({ id: sampleId(number), createdAt: at, author });

export const machineId = sampleId(300);
export const jobId = sampleId(400);
export const surveyId = sampleId(410);

export function sampleMachineSummary(overrides: Partial<MachineSummary> = {}): MachineSummary {
  return machineSummary.parse({
    id: machineId,
    name: "Fellgate Unit 2",
    plantTag: "FG-2-GT",
    revision: 1,
    archived: false,
    createdAt: at,
    version: 1,
    ...overrides,
  });
}

/** The machine whose bores and components the sample calls are about. */
export function sampleMachine(overrides: Partial<Machine> = {}): Machine {
  return machineSchema.parse({
    ...sampleMachineSummary(),
    documentHash: `sha256:${"3".repeat(64)}`,
    document: {
      name: "Fellgate Unit 2",
      plantTag: "FG-2-GT",
      downstream: "Toward the generator.",
      units: axisRequest.units,
      stations: axisRequest.stations.map(({ id, z, target, tolerance }) => ({
        id,
        kind: id.startsWith("brg") ? "bearing" : "casing",
        z,
        target,
        tolerance,
      })),
      reference: ["brg-1", "brg-2"],
      components: moveRequest.components.map((component) => ({
        ...component,
        stations: component.id === "casing" ? ["cas-1"] : ["cas-2"],
      })),
      shims: { cutToSize: { increment: 0.01 } },
      cautions: ["Lift with the maker's gear alone."],
    },
    ...overrides,
  });
}

export function sampleJobSummary(overrides: Partial<JobSummary> = {}): JobSummary {
  return jobSummary.parse({
    id: jobId,
    title: "Unit 2, major outage",
    machineId,
    machineName: "Fellgate Unit 2",
    machineRevision: 1,
    revision: 1,
    state: "open",
    createdAt: at,
    signedAt: null,
    version: 7,
    ...overrides,
  });
}

const resultOf = (kind: "axis-deviation" | "bore-fit" | "shim-move") =>
  sampleResponse(kind)["result"] as Record<string, unknown>;

/** A survey as found of the sample machine, one of whose readings was taken back. */
export function sampleSurvey(isComputed = true): JobRecord["surveys"][number] {
  const reading = (station: string) => ({
    station,
    form: "wire" as const,
    takenAt: at,
    upperHalf: "on" as const,
    wire: { left: 180, right: 180, bottom: 180, measuredTo: "centre" as const },
  });
  return {
    ...entry(410),
    survey: { stage: "as_found", sameSetUp: false },
    flags: [{ code: "closing_reading_missing", detail: "brg-1 was not read once more.", station: "brg-1" }],
    readings: [
      { ...entry(411), reading: reading("brg-1"), counts: true, standing: "in_use", sourceFile: null },
      { ...entry(412), reading: reading("cas-1"), counts: false, standing: "withdrawn", sourceFile: null },
    ],
    result: isComputed
      ? ({
          ...entry(413),
          boreFit: sampleId(200),
          axisDeviation: sampleId(201),
          engineVersion: "1.0.0",
          current: true,
          fits: resultOf("bore-fit")["bores"],
          ...resultOf("axis-deviation"),
          drift: null,
        } as unknown as NonNullable<JobRecord["surveys"][number]["result"]>)
      : null,
  };
}

/** A job as the service answers it: open, one survey computed, moves planned, some checks to be answered. */
export function sampleJob(overrides: Partial<JobRecord> = {}): JobRecord {
  const { document, documentHash } = sampleMachine();
  return jobRecord.parse({
    ...sampleJobSummary(),
    machine: document,
    machineHash: documentHash,
    details: {
      title: "Unit 2, major outage",
      seen: "downstream",
      people: [{ name: "Ines Alder", role: "Alignment engineer" }],
      axis: { method: "two_station", through: ["brg-1", "brg-2"] },
    },
    checks: setUpChecks.map(({ id, text }, index) =>
      index === 0
        ? { check: id, text, answer: "yes", by: "Ines Alder", at, remark: null }
        : { check: id, text, answer: null, by: null, at: null, remark: null },
    ),
    surveys: [sampleSurvey()],
    plans: [
      {
        ...entry(420),
        survey: surveyId,
        surveyResult: sampleId(413),
        current: true,
        calculation: sampleId(202),
        from: {
          reference: ["brg-1", "brg-2"],
          stations: resultOf("axis-deviation")["stations"],
        },
        result: resultOf("shim-move"),
      },
    ],
    moves: [],
    confirmations: [],
    concessions: [],
    axisAcceptances: [],
    comments: [],
    attachments: [],
    flags: [{ code: "closing_reading_missing", detail: "brg-1 was not read once more.", station: "brg-1" }],
    signOff: {
      ready: false,
      obstacles: [
        { code: "station_does_not_conform", detail: "cas-1 exceeds its tolerance.", station: "cas-1" },
        { code: "station_does_not_conform", detail: "cas-2 is undecided.", station: "cas-2" },
      ],
    },
    signature: null,
    revisions: [{ revision: 1, reason: null, signedAt: null }],
    cautions: [],
    ...overrides,
  });
}

/** The same job, signed. */
export function signedJob(): JobRecord {
  const signedAt = "2026-11-20T15:00:00.000Z";
  return sampleJob({
    state: "signed",
    signedAt,
    signOff: { ready: false, obstacles: [] },
    signature: {
      ...entry(430),
      createdAt: signedAt,
      name: "Ines Alder",
      meaning: "As left, reviewed.",
      recordHash: `sha256:${"4".repeat(64)}`,
    },
    revisions: [{ revision: 1, reason: null, signedAt }],
  });
}
