import { z } from "zod";
import { deviationAnswer, warningSchema } from "./common.ts";

const pair = z.object({ h: z.number(), v: z.number() });
const pairOf = (description: string) => pair.meta({ description });

const stationAnswer = z
  .object({
    id: z.string(),
    z: z.number(),
    role: z.enum(["near", "far"]).meta({ description: "By the distance from the source." }),
    beam: pairOf(
      "Where the beam passes, relative to the bore's centre; with the drift shared out, where it was.",
    ),
    expected: pairOf("Where it should pass."),
    off: deviationAnswer.meta({ description: "beam − expected." }),
    guard: z.number().nullable().meta({
      description: "Radial expanded uncertainty of the beam at `level`; null where none is stated.",
    }),
    within: z.boolean().meta({ description: "Whether off.radial + guard is no more than wanted." }),
    after: z
      .object({
        beam: pairOf("Relative to the bore's centre."),
        distance: z.number().meta({ description: "From where it should pass." }),
        within: z.boolean(),
      })
      .nullable()
      .meta({
        id: "SightAfterMove",
        description: "Predicted, when the source has moved as answered; null where the survey is refused.",
      }),
  })
  .meta({ id: "SightStationAnswer" });

const adjustmentAnswer = z
  .object({
    shift: pairOf("Of the beam at sourceZ, in offset units."),
    tilt: pairOf("Of the beam, offset units per axial unit: how far it moves further on for each unit of z."),
    tiltMilliradians: pairOf("The same as an angle."),
    moves: z
      .array(
        z.object({
          at: z.string().meta({ description: "Id of the support, or pivot." }),
          z: z.number(),
          h: z.number(),
          v: z.number(),
        }),
      )
      .nullable()
      .meta({
        description:
          "What to move at the adjuster, in offset units: each support, or the pivot, which also has the tilt. Null where none is stated.",
      }),
  })
  .meta({ id: "SightAdjustment" });

const bendAnswer = z
  .object({
    length: z.number().meta({ description: "In axial units." }),
    h: z.number(),
    v: z.number(),
    radial: z.number(),
    stations: z.array(z.object({ id: z.string(), h: z.number(), v: z.number() })),
  })
  .meta({
    id: "SightBend",
    description:
      "How far air bends the beam off the straight line in which it leaves the source, at the end of `length` and at each station: ½ · length² · dn/dT · gradient, dn/dT = −0.93e-6 per °C; away from the warm side. Spots hold it already: it enters the uncertainty of what is measured off this line.",
  });

const driftAnswer = z
  .object({
    h: z.number(),
    v: z.number(),
    radial: z.number(),
    allowed: z.number(),
    within: z.boolean(),
    verdict: z.enum(["accepted", "shared_out", "refused"]),
    corrections: z
      .array(z.object({ id: z.string(), h: z.number(), v: z.number() }))
      .meta({ description: "What was added to each beam as read; none unless it was shared out." }),
  })
  .meta({ id: "SightDriftAnswer", description: "Closing less opening reading of the beam." });

export const sightLineResult = z
  .object({
    stations: z.array(stationAnswer).meta({ description: "In the order sent." }),
    adjustment: adjustmentAnswer.nullable().meta({
      description: "What brings the beam to where it should pass; null where the survey is refused.",
    }),
    amplification: z
      .object({
        factor: z
          .number()
          .meta({ description: "Uncertainty of the shift at the source over that of a spot." }),
        limit: z.number().meta({ description: "Above it the answer warns." }),
      })
      .meta({ id: "SightAmplification" }),
    bend: bendAnswer.optional().meta({ description: "Where sightPath is stated." }),
    drift: driftAnswer.optional().meta({ description: "Where drift is stated." }),
    repeat: z.boolean().meta({ description: "False when the beam runs as wanted at both stations." }),
    next: z.enum(["go_on", "adjust_and_read_again", "read_again"]).meta({
      description:
        "go_on: measure. adjust_and_read_again: move the source, then read both stations. read_again: hold the source still first.",
    }),
    warnings: z.array(warningSchema),
  })
  .meta({ id: "SightLineResult" });

export type SightLineResult = z.infer<typeof sightLineResult>;
