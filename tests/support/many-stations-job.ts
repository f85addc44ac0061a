import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import { asFoundReadings, fellgateJobDetails } from "../../server/demo/fellgate-job.ts";
import type { Reading } from "../../shared/schemas/job-entries.ts";
import { JobWriter } from "./job-writer.ts";

/** A train of `count` stations: the demo's, again and again along z, read with the upper halves off. */
export function manyStationsJob(count: number): JobWriter {
  const { name, downstream, units, stations } = fellgateDocument;
  const opening = asFoundReadings().filter(({ closing }) => closing !== true);
  const idOf = (id: string, index: number) => `${Math.floor(index / stations.length) + 1}-${id}`;
  const many = Array.from({ length: count }, (_, index) => {
    const station = stations[index % stations.length] as (typeof stations)[number];
    return {
      ...station,
      id: idOf(station.id, index),
      z: station.z + Math.floor(index / stations.length) * 7_500,
    };
  });
  const through = [many[0]?.id ?? "", many.at(-1)?.id ?? ""];
  const job = new JobWriter(
    { name, downstream, units, stations: many, reference: through },
    { ...fellgateJobDetails, axis: { method: "two_station", through } },
  );
  const readings = many.map((station, index): Reading => {
    const reading = opening[index % opening.length] as Reading;
    return { ...reading, station: station.id, upperHalf: "off" };
  });
  job.survey({ stage: "as_found", sameSetUp: false, instrument: "gauge-1" }, readings);
  return job;
}
