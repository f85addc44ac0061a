import { describe, expect, it } from "vitest";
import { JobWriter } from "../../tests/support/job-writer.ts";
import { asFoundReadings, fellgateJobDetails } from "../demo/fellgate-job.ts";
import { fellgateDocument } from "../demo/fellgate-document.ts";
import { writeFellgateJob } from "../../tests/support/job-record.ts";
import { historyOf } from "./machine-history.ts";
import type { Reading } from "../../shared/schemas/job-entries.ts";

const machine = { id: "0193a5e0-7c00-7000-8000-0000000000aa", document: fellgateDocument };

/** The readings of a later outage: the same machine, every instrument set up anew, one bore moved. */
function laterReadings(shiftOf: (station: string) => { h: number; v: number }): Reading[] {
  return asFoundReadings().map((reading) => {
    const takenAt = reading.takenAt.replace("2026", "2027");
    const { h, v } = shiftOf(reading.station);
    if (reading.form === "points") {
      const side = reading.seen === "upstream" ? -1 : 1;
      const points = reading.points.map((point) => ({ ...point, h: point.h + side * h, v: point.v + v }));
      return { ...reading, takenAt, points };
    }
    if (reading.form !== "turned_gauge") return { ...reading, takenAt };
    const side = reading.seen === "upstream" ? -1 : 1;
    const readings = reading.readings.map((one) => {
      const angle = (one.clockDeg * Math.PI) / 180;
      // To first order the wall is farther by the part of the shift that points at it: 0.1 mm in 180 mm, 3e-5 mm off.
      return { ...one, reading: one.reading + side * h * Math.sin(angle) + v * Math.cos(angle) };
    });
    return { ...reading, takenAt, readings };
  });
}

function foundJob(readings: Reading[]) {
  const job = new JobWriter(fellgateDocument, fellgateJobDetails);
  job.survey({ stage: "as_found", sameSetUp: false, instrument: "gauge-1" }, readings);
  return job.record();
}
const zOf = (id: string) => fellgateDocument.stations.find((station) => station.id === id)?.z ?? 0;

describe("historyOf", () => {
  it("takes each outage's own axis out: a new line of sight is no drift", () => {
    const first = foundJob(asFoundReadings());
    const tilted = foundJob(laterReadings((id) => ({ h: 0.2 + 2e-5 * zOf(id), v: -0.1 - 1e-5 * zOf(id) })));
    const { stations } = historyOf(machine, [first, tilted], false);
    for (const { id, drifts } of stations) {
      const [drift] = drifts;
      expect(Math.abs(drift?.change.h ?? 1), id).toBeLessThan(5e-4); // mm
      expect(Math.abs(drift?.change.v ?? 1), id).toBeLessThan(5e-4); // mm
      // A station that set the axis lies on it in both outages: nothing is left to test.
      expect(drift?.changed, id).toBe(fellgateDocument.reference?.includes(id) ? null : false);
    }
  });

  it("finds the one station that moved, and marks those that set the axis", () => {
    const first = foundJob(asFoundReadings());
    const moved = foundJob(laterReadings((id) => (id === "cas-3" ? { h: 0.15, v: -0.1 } : { h: 0, v: 0 })));
    const { stations } = historyOf(machine, [first, moved], false);
    const changed = stations.filter(({ drifts }) => drifts[0]?.changed).map(({ id }) => id);
    expect(changed).toEqual(["cas-3"]);
    const drift = stations.find(({ id }) => id === "cas-3")?.drifts[0];
    expect(Math.abs((drift?.change.h ?? 0) - 0.15)).toBeLessThan(1e-3); // mm
    const marked = stations.filter(({ drifts }) => drifts[0]?.reference).map(({ id }) => id);
    expect(marked).toEqual(fellgateDocument.reference);
  });

  it("compares what one outage left with what the next found, in the order of their readings", () => {
    const left = writeFellgateJob("left").record();
    const later = foundJob(laterReadings(() => ({ h: 0, v: 0 })));
    const { outages, stations } = historyOf(machine, [later, left], false);
    expect(outages.map(({ at }) => at.slice(0, 4))).toEqual(["2026", "2027"]);
    const casing = stations.find(({ id }) => id === "cas-3");
    const [before, after] = casing?.outages ?? [];
    expect(before?.asFound?.position).not.toEqual(before?.asLeft?.position);
    const drift = casing?.drifts[0];
    const expected = (after?.asFound?.position.v ?? 0) - (before?.asLeft?.position.v ?? 0);
    expect(Math.abs((drift?.change.v ?? Number.NaN) - expected)).toBeLessThan(1e-12); // mm
  });

  it("leaves out jobs without a computed survey, and has no drift with a single one", () => {
    const started = writeFellgateJob("started").record();
    const { outages, stations } = historyOf(machine, [started, foundJob(asFoundReadings())], true);
    expect(outages).toHaveLength(1);
    expect(stations.every(({ drifts }) => drifts.length === 0)).toBe(true);
  });
});
