import { z } from "zod";
import { axisDeviationResult } from "./axis-deviations.ts";
import { covarianceAnswer, deviationAnswer, warningSchema } from "./common.ts";

const vector = z.object({ h: z.number(), v: z.number() }).meta({ id: "PlaneVector" });

const changeTest = {
  statistic: z.number().nullable().meta({
    description: "ΔᵀΣ⁻¹Δ of the change and its covariance; null where it cannot be tested.",
  }),
  limit: z.number().nullable().meta({
    description:
      "χ²(level; 2); with finite degrees of freedom ν, 2·F(level; 2, ν), the confidence ellipse of a covariance of known shape.",
  }),
  dof: z.number().nullable().meta({
    description: "Effective, by Welch–Satterthwaite along the change; null is infinite, or not tested.",
  }),
};

const referenceStation = z
  .object({
    id: z.string(),
    change: vector.meta({ description: "after − before, as read." }),
    deviation: vector.meta({
      description:
        "The change as tested: as read, or off the common shift and tilt where `frame` is reference.",
    }),
    ...changeTest,
    repeats: z.boolean().nullable(),
  })
  .meta({ id: "ReferenceRepeat" });

const referenceAnswer = z
  .object({
    repeats: z.boolean().nullable().meta({ description: "Null: not shown either way; a warning says why." }),
    cause: z
      .enum(["none", "common", "station", "common_and_station", "several", "undetermined"])
      .nullable()
      .meta({
        description:
          "Why they do not repeat. common: all share a shift and tilt. station: one moved by itself. several: more than one did. undetermined: too few stations, or too small a change, to tell. Null where repeats is.",
      }),
    moved: z.array(z.string()).meta({ description: "Reference stations told apart as having moved." }),
    shift: vector.nullable().meta({
      description: "Common change at z = 0, of the reference stations that did not move by themselves.",
    }),
    tilt: vector.nullable().meta({
      description: "Common change in offset units per axial unit; null with fewer than two stations.",
    }),
    perStation: z.array(referenceStation),
  })
  .meta({ id: "ReferenceAnswer" });

const movedAnswer = z
  .object({
    id: z.string(),
    planned: vector.nullable().meta({ description: "Null: the log has a move that nobody planned." }),
    achieved: vector.nullable().meta({ description: "Null where a survey lacks the station." }),
    ratio: z.number().nullable().meta({
      description: "(achieved·planned)/|planned|²: 1 when all was done; null when planned is 0 or null.",
    }),
    difference: vector.nullable().meta({ description: "achieved − planned." }),
    covariance: covarianceAnswer.nullable().meta({ description: "Of achieved." }),
    ...changeTest,
    agrees: z.boolean().nullable().meta({
      description:
        "Whether the difference can be chance: what the statistic tests; null where it cannot be told.",
    }),
  })
  .meta({ id: "MovedStation" });

const unmovedAnswer = z
  .object({
    id: z.string(),
    change: deviationAnswer,
    covariance: covarianceAnswer.nullable(),
    ...changeTest,
    changed: z.boolean().nullable().meta({ description: "Null where it cannot be tested." }),
  })
  .meta({ id: "UnmovedStation", description: "Neither reference nor moved." });

const station = axisDeviationResult.shape.stations.element;
const verdictAnswer = station
  .pick({
    id: true,
    deviation: true,
    expandedUncertainty: true,
    covariance: true,
    verdict: true,
    ratio: true,
    reference: true,
    warnings: true,
  })
  .meta({ id: "AsLeftVerdict" });

export const confirmationResult = z
  .object({
    frame: z.enum(["fixed", "reference"]).meta({
      description:
        "What changes are taken from. fixed: as read. reference: off the shift and tilt that the reference stations share.",
    }),
    reference: referenceAnswer,
    moved: z.array(movedAnswer),
    unmoved: z.array(unmovedAnswer),
    unexpected: z.array(z.string()).meta({
      description:
        "Ids of stations that should not have moved and did, in the order sent: reference stations too, where it can be told which, or where the set-up was not touched.",
    }),
    outstanding: z
      .array(z.string())
      .meta({ description: "Ids not re-measured since their last move: reference stations first." }),
    verdicts: z.array(verdictAnswer).meta({
      description:
        "Of every station measured after, as POST /v1/axis-deviations answers for that survey and those reference stations that stayed. Empty where no axis can be laid.",
    }),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "ConfirmationResult" });

export type ConfirmationResult = z.infer<typeof confirmationResult>;
