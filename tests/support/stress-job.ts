import { createHash } from "node:crypto";
import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import {
  asFoundReadings,
  fellgateChecks,
  fellgateJobDetails,
  movesAsPlanned,
} from "../../server/demo/fellgate-job.ts";
import type { Reading } from "../../shared/schemas/job-entries.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import { limits } from "../../shared/limits.ts";
import { JobWriter } from "./job-writer.ts";

const stationCount = 60;
const moveCount = 40;
const attachmentCount = 10;
/** Names and notes as long as they may be, without a space to break them at. */
const longName = "Überlangername".repeat(9).slice(0, limits.nameLength);
const longNote = "Bemerkung/".repeat(limits.noteLength / 10);
/** Letters that no font of the PDF has: Greek, Chinese, Hebrew, Arabic. */
export const foreignName = "Ελένη 王小明 שרה أمل";

const { stations, components = [] } = fellgateDocument;
const copies = Math.ceil(stationCount / stations.length);
const copied = (copy: number, id: string): string => `${copy + 1}-${id}`;
const lengthMm = 7_500;

/** Four machines and a bit in a row, coupled to nothing, every text of it as long as it may be. */
const machine: MachineDocument = {
  ...fellgateDocument,
  name: longName,
  plantTag: longName,
  owner: longName,
  remarks: longNote,
  stations: everyCopy(stations)
    .slice(0, stationCount)
    .map(([copy, station]) => ({
      ...station,
      id: copied(copy, station.id),
      label: longName,
      z: station.z + copy * lengthMm,
    })),
  reference: ["1-brg-1", `${copies}-brg-1`],
  components: everyCopy(components)
    .map(([copy, component]) => ({
      ...component,
      id: copied(copy, component.id),
      stations: (component.stations ?? [])
        .map((id) => copied(copy, id))
        .filter(
          (id) =>
            stations.length * copy + stations.findIndex((one) => copied(copy, one.id) === id) < stationCount,
        ),
      supports: (component.supports ?? []).map((support) => ({
        ...support,
        id: copied(copy, support.id),
        z: support.z + copy * lengthMm,
      })),
    }))
    .filter((component) => component.stations.length > 0),
  indicators: [],
  cautions: [longNote.slice(0, 400)],
};

/**
 * A job as large as they come: sixty stations, forty moves, ten attachments, surveys after steps, concessions, checks
 * left unanswered or answered no, names without a space and in scripts that the PDF's letters do not have.
 */
export function stressJob(): JobWriter {
  const job = new JobWriter(machine, {
    ...fellgateJobDetails,
    title: longName,
    site: longName,
    orderNumber: longName,
    remarks: longNote,
    people: [
      { name: foreignName, role: longName },
      { name: longName, role: longName },
    ],
    axis: { method: "two_station", through: machine.reference ?? [] },
  });
  for (const check of fellgateChecks.slice(0, 4))
    job.add("check", { ...check, remark: longNote.slice(0, 300) });
  job.add("check", { check: "drift_within_limits", answer: "no", by: foreignName });
  const readings = readingsOf(asFoundReadings());
  const found = job.survey(
    {
      stage: "as_found",
      sameSetUp: false,
      instrument: "gauge-1",
      label: longName,
      conditions: {
        temperatureUnit: "C",
        ambient: -0.04,
        metal: Array.from({ length: 12 }, (_, index) => ({ place: `${longName}`, value: 20 + index })),
        remark: longNote.slice(0, 500),
      },
    },
    readings,
  );
  const plan = job.plan(found);
  const moves = movesAsPlanned(plan);
  [...moves, ...moves]
    .slice(0, moveCount)
    .forEach((move, index) =>
      job.add("move", { ...move, at: fellgateDay(index), person: longName, reason: longNote.slice(0, 200) }),
    );
  job.survey({ stage: "after_step", sameSetUp: true, instrument: "gauge-1", label: "Casing set" }, readings);
  job.survey(
    { stage: "after_step", sameSetUp: true, instrument: "gauge-1", label: longName },
    readings.slice(0, 20).concat(readings.slice(stations.length * (copies - 1))),
  );
  const left = job.survey({ stage: "as_left", sameSetUp: true, instrument: "gauge-1" }, readings);
  job.confirm(found, left);
  job.add("concession", { station: "1-exh-1", name: foreignName, reason: longNote });
  job.add("concession", { station: "2-cas-5", name: longName, reason: "Within the maker's letter." });
  for (let index = 0; index < attachmentCount; index += 1) {
    job.add("attachment", {
      file: `01936f00-0000-7000-8000-0000000000f${index}`,
      name: `${longName}.jpg`,
      mediaType: "image/jpeg",
      bytes: 1_234_567 + index,
      sha256: `sha256:${createHash("sha256").update(String(index)).digest("hex")}`,
      caption: longNote.slice(0, 300),
    });
  }
  job.add("comment", { text: `${foreignName} σ µ Δ ${longNote}` });
  return job;
}

const fellgateDay = (index: number): string =>
  `2026-11-${String(6 + Math.floor(index / 8)).padStart(2, "0")}T${String(8 + (index % 8)).padStart(2, "0")}:00:00Z`;

/** The demo's readings at every copy of its stations. */
function readingsOf(demo: readonly Reading[]): Reading[] {
  const opening = demo.filter(({ closing }) => closing !== true);
  return machine.stations.map((station, index) => ({
    ...(opening[index % opening.length] as Reading),
    station: station.id,
    person: foreignName,
  }));
}

function everyCopy<Item>(items: readonly Item[]): [copy: number, item: Item][] {
  return Array.from({ length: copies }, (_, copy) =>
    items.map((item): [number, Item] => [copy, item]),
  ).flat();
}
