import { z } from "zod";
import { limits, trialWork } from "../limits.ts";
import { warningSchema } from "./common.ts";

const thousands = (value: number) => value.toLocaleString("en-GB");
const each = (name: Exclude<keyof typeof trialWork, "station">) =>
  `${thousands(trialWork[name].each)} + ${trialWork[name].perReading === 1 ? "" : `${trialWork[name].perReading} × `}`;

export const monteCarloSchema = z
  .strictObject({
    trials: z
      .int()
      .min(limits.trialsMin)
      .max(limits.trialsMax)
      .meta({
        description: `At least ${2 * limits.trialsOutside}/(1 − level). 100,000 settle most comparisons.`,
      }),
    seed: z
      .int()
      .min(0)
      .max(2 ** 32 - 1)
      .meta({ description: "The same seed gives the same numbers, to the last bit." }),
    significantDigits: z.int().min(1).max(2).optional().meta({
      description:
        "Digits of a standard uncertainty that the comparison takes to mean something (n_dig of JCGM 101, 7.9.2). Absent: 2 for one that begins with 1, else 1. Two digits of a larger one ask for more trials than a call may have.",
    }),
  })
  .meta({
    id: "MonteCarlo",
    description:
      "Propagates the distributions of what was read by so many trials (JCGM 101:2008), and tells whether the first-order interval is confirmed. The stream of each bore and station is set by seed and id, so that neither their order nor what else is sent changes its numbers. " +
      `Trials × work of one trial is at most ${thousands(limits.trialWorkPerCall)}, for all bores together and for all stations together. Work of a bore with n readings: ${each("circle")}n for a circle, a gauge, a wire or a target; ${each("surface")}n with taper, tilt, an outlier rule, or on an arc of few degrees; ${each("ellipse")}n for an ellipse; ${each("minimum_zone")}n for minimum_zone; ${each("maximum_inscribed")}n for maximum_inscribed; ${each("minimum_circumscribed")}n for minimum_circumscribed. ` +
      `Work of an axis: ${trialWork.station} for every station and for every reference station; and ${each("searchedAxis")}n for minimum_zone and least_absolute with n reference stations.`,
  });

const ends = (description: string) => z.object({ low: z.number(), high: z.number() }).meta({ description });

/** One quantity by trials. */
const figure = z
  .object({
    mean: z.number().nullable().meta({ description: "Null where the distribution has none." }),
    standardUncertainty: z
      .number()
      .nullable()
      .meta({ description: "Standard deviation of the trials; null where the distribution has none." }),
    interval: z.array(z.number()).min(2).max(2).nullable().meta({
      description:
        "[low, high], the probabilistically symmetric coverage interval at the call's level; null where trials are too few.",
    }),
    significantDigits: z.int(),
    tolerance: z.number().meta({
      description: "δ: half a unit of the last of these digits of the first-order standard uncertainty.",
    }),
    difference: ends("d_low and d_high: how far its ends lie from those of y ± U of first order.").nullable(),
    sampling: ends(
      "How far each end may be off because the trials are so many only, and because some failed. Null: as far as may be.",
    ).nullable(),
    confirmed: z.boolean().nullable().meta({
      description: "Whether neither difference passes the tolerance; null where sampling leaves it open.",
    }),
  })
  .meta({
    id: "MonteCarloFigure",
    description:
      "In offset units; mean and interval of a diameter in bore units, as the diameter itself. The comparison is that of JCGM 101:2008, clause 8.",
  });

const common = {
  trials: z.int(),
  seed: z.int(),
  failed: z.int().meta({ description: "Trials that could not be computed; warnings say why." }),
  h: figure.nullable().meta({ description: "Null where no uncertainty is known." }),
  v: figure.nullable(),
  confirmed: z
    .boolean()
    .nullable()
    .meta({ description: "Of all figures: true when each is, false when one is not, else null." }),
  warnings: z.array(warningSchema),
};

export const boreMonteCarloAnswer = z
  .object({
    ...common,
    diameter: figure.nullable().meta({ description: "Null where the diameter is not known." }),
  })
  .meta({ id: "BoreMonteCarlo", description: "Centre and diameter by trials; only where asked for." });

export const stationMonteCarloAnswer = z
  .object(common)
  .meta({ id: "StationMonteCarlo", description: "The deviation by trials; only where asked for." });

export type MonteCarloRequest = z.infer<typeof monteCarloSchema>;
export type MonteCarloFigure = z.infer<typeof figure>;
export type BoreMonteCarlo = z.infer<typeof boreMonteCarloAnswer>;
export type StationMonteCarlo = z.infer<typeof stationMonteCarloAnswer>;
