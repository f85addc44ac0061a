import { z } from "zod";
import { covarianceAnswer, deviationAnswer, verdictSchema } from "./common.ts";
import { boreFitRequest } from "./bore-fits.ts";

const place = z
  .object({
    survey: z.uuid(),
    position: z
      .object({ h: z.number(), v: z.number() })
      .meta({ description: "Off the outage's own axis: deviation + target." }),
    deviation: deviationAnswer,
    covariance: covarianceAnswer.nullable(),
    verdict: verdictSchema.nullable(),
  })
  .meta({ id: "StationAtOutage", description: "In the offset unit of the newest revision." });

const outage = z
  .object({
    jobId: z.uuid(),
    title: z.string(),
    state: z.enum(["open", "signed"]),
    at: z.iso.datetime().meta({ description: "When the last reading of its last survey was taken." }),
    machineRevision: z.number().int(),
  })
  .meta({ id: "Outage" });

export const machineHistory = z
  .object({
    machineId: z.uuid(),
    units: boreFitRequest.shape.units,
    level: z.number(),
    outages: z
      .array(outage)
      .meta({ description: "Oldest first; jobs without a computed survey are left out." }),
    more: z.boolean().meta({ description: "Whether older jobs are left out." }),
    stations: z.array(
      z.object({
        id: z.string(),
        label: z.string().nullable(),
        z: z.number(),
        outages: z.array(
          z.object({
            jobId: z.uuid(),
            reference: z.boolean().meta({ description: "Whether the station set the axis in that job." }),
            asFound: place.nullable(),
            asLeft: place.nullable(),
          }),
        ),
        drifts: z
          .array(
            z.object({
              from: z.uuid().meta({ description: "The job that left it." }),
              to: z.uuid().meta({ description: "The next job that found it." }),
              change: deviationAnswer.meta({
                description: "Found less left, each off its outage's own axis.",
              }),
              covariance: covarianceAnswer.nullable(),
              statistic: z.number().nullable().meta({ description: "ΔᵀΣ⁻¹Δ of the change." }),
              limit: z.number().nullable().meta({ description: "χ²(level; 2), or 2·F(level; 2, ν)." }),
              changed: z.boolean().nullable().meta({ description: "Null where it cannot be tested." }),
              reference: z.boolean().meta({
                description:
                  "Whether the station set the axis in either job: its drift is then hidden in the axis.",
              }),
              targetChanged: z.boolean(),
            }),
          )
          .meta({
            description: "Between one outage and the next, tested on the (h, v) vector, never on its length.",
          }),
      }),
    ),
  })
  .meta({ id: "MachineHistory" });

export type MachineHistory = z.infer<typeof machineHistory>;
