import { machineHistory, type MachineHistory } from "../../../shared/schemas/machine-history.ts";
import { machineId } from "./sample-job.ts";
import { sampleId } from "./samples.ts";

const [first, second] = [sampleId(401), sampleId(402)];
const vector = (h: number, v: number) => ({
  h,
  v,
  radial: Math.hypot(h, v),
  clockDeg: h === 0 && v === 0 ? null : 90,
});
const place = (h: number, v: number, verdict: "conforms" | "exceeds") => ({
  survey: sampleId(410),
  position: { h, v },
  deviation: vector(h, v),
  covariance: null,
  verdict,
});

/** Two outages: cas-1 was moved in the first and had drifted by the second; brg-1 set the axis. */
export function sampleHistory(): MachineHistory {
  const outage = (jobId: string, title: string, at: string) => ({
    jobId,
    title,
    state: "signed" as const,
    at,
    machineRevision: 1,
  });
  return machineHistory.parse({
    machineId,
    units: { axial: "mm", bore: "mm", offset: "mm" },
    level: 0.95,
    outages: [
      outage(first, "Unit 2, major outage", "2022-11-14T10:30:00.000Z"),
      outage(second, "Unit 2, minor outage", "2026-11-14T10:30:00.000Z"),
    ],
    more: false,
    stations: [
      {
        id: "cas-1",
        label: null,
        z: 1200,
        outages: [
          {
            jobId: first,
            reference: false,
            asFound: place(0.2, -0.4, "exceeds"),
            asLeft: place(0.01, 0, "conforms"),
          },
          { jobId: second, reference: false, asFound: place(0.1, -0.2, "exceeds"), asLeft: null },
        ],
        drifts: [
          {
            from: first,
            to: second,
            change: vector(0.09, -0.2),
            covariance: null,
            statistic: 41.5,
            limit: 5.99,
            changed: true,
            reference: false,
            targetChanged: false,
          },
        ],
      },
      {
        id: "brg-1",
        label: null,
        z: 0,
        outages: [
          {
            jobId: first,
            reference: true,
            asFound: place(0, 0, "conforms"),
            asLeft: place(0, 0, "conforms"),
          },
          { jobId: second, reference: true, asFound: place(0, 0, "conforms"), asLeft: null },
        ],
        drifts: [
          {
            from: first,
            to: second,
            change: vector(0, 0),
            covariance: null,
            statistic: null,
            limit: null,
            changed: null,
            reference: true,
            targetChanged: false,
          },
        ],
      },
    ],
  });
}
