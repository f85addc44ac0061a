import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import { asFoundReadings, asLeftReadings, fellgateJobDetails } from "../../server/demo/fellgate-job.ts";
import type { Reading } from "../../shared/schemas/job-entries.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import { JobWriter } from "./job-writer.ts";

/** What station ids may be, and what spreadsheet programs, XML, CSV and DXF must all take as mere text. */
const ids = [
  "=1+1",
  "+cmd|' /C calc'!A0",
  "-2",
  "@SUM(A1:A9)",
  'say "no"',
  "a,b;c",
  "<b>&amp;</b>",
  "\u202elamron",
  "%%d^J\\U+000A",
  "W".repeat(64),
  "_x0041_",
  "'quoted",
  "{\\fArial;x}",
  "Ø500 µ",
];

/** Text in which lines end and tabs stand. */
export const hostileText = '=HYPERLINK("http://x.invalid","a")\r\n0\nSECTION\t]]></t> %%u\u2028&G &12\u202e';
const hostileName = `=${"É".repeat(59)}${"&".repeat(60)}`;

/** The demo's job where every name is a trap, in inches and mils. */
export function hostileJob(): JobWriter {
  const idOf = new Map(fellgateDocument.stations.map(({ id }, index) => [id, ids[index] ?? id]));
  const rename = (id: string): string => idOf.get(id) ?? id;
  const machine: MachineDocument = {
    ...fellgateDocument,
    name: hostileName,
    plantTag: "@tag",
    owner: '"; DROP',
    downstream: "-> out & <in>",
    units: { axial: "in", bore: "in", offset: "mil" },
    stations: fellgateDocument.stations.map((station) => ({
      ...station,
      id: rename(station.id),
      label: "=label",
    })),
    reference: (fellgateDocument.reference ?? []).map(rename),
    components: (fellgateDocument.components ?? []).map((component) => ({
      ...component,
      stations: (component.stations ?? []).map(rename),
    })),
    cautions: [hostileText],
  };
  const job = new JobWriter(machine, {
    ...fellgateJobDetails,
    title: hostileName,
    people: [{ name: "=cmd", role: "+role" }],
    axis: { method: "two_station", through: (fellgateJobDetails.axis?.through ?? []).map(rename) },
    remarks: hostileText,
  });
  const renamed = (readings: readonly Reading[]) =>
    readings.map((reading) => ({ ...reading, station: rename(reading.station), person: "\t=tab" }));
  const found = job.survey(
    { stage: "as_found", sameSetUp: false, instrument: "gauge-1" },
    renamed(asFoundReadings()),
  );
  const plan = job.plan(found);
  const stations = job
    .resultOf(found)
    .stations.map((station, index) => ({ ...station, id: fellgateDocument.stations[index]?.id ?? "" }));
  const predicted = plan.predicted.map((one, index) => ({
    ...one,
    id: fellgateDocument.stations[index]?.id ?? "",
  }));
  job.survey(
    { stage: "as_left", sameSetUp: true, label: "\r=left", instrument: "gauge-1" },
    renamed(asLeftReadings({ stations }, { predicted })),
  );
  job.add("comment", { text: hostileText });
  job.add("concession", { station: ids[0] ?? "", name: "@boss", reason: "-because" });
  return job;
}

/** A machine of one station, measured alone. */
export function oneStationJob(): JobWriter {
  const [station] = fellgateDocument.stations;
  const { name, downstream, units } = fellgateDocument;
  const job = new JobWriter(
    { name, downstream, units, stations: station ? [station] : [] },
    { ...fellgateJobDetails, axis: { method: "line_of_sight" } },
  );
  job.survey(
    { stage: "as_found", sameSetUp: false, instrument: "gauge-1" },
    asFoundReadings().filter((reading) => reading.station === station?.id),
  );
  return job;
}

/** Stations at both ends of what an axial coordinate may be. */
export function farApartJob(): JobWriter {
  const [first, second] = fellgateDocument.stations;
  const { name, downstream, units } = fellgateDocument;
  const stations =
    first && second
      ? [
          { ...first, z: -1e9 },
          { ...second, z: 1e9 },
        ]
      : [];
  const through = stations.map(({ id }) => id);
  const job = new JobWriter(
    { name, downstream, units: { ...units, axial: "m" }, stations, reference: through },
    { ...fellgateJobDetails, axis: { method: "two_station", through } },
  );
  job.survey(
    { stage: "as_found", sameSetUp: false, instrument: "gauge-1" },
    asFoundReadings().filter(({ station }) => through.includes(station)),
  );
  return job;
}
