import { z } from "zod";

export const ellipseAxesSchema = z
  .object({
    major: z.number().nullable().meta({
      description: "Diameter, in bore units; null where the gauge's zero does not tell it.",
    }),
    minor: z.number().nullable(),
    majorAt20C: z.number().nullable().optional().meta({
      description: "As diameterAt20C, of the major axis; absent where the bore states no temperature.",
    }),
    minorAt20C: z.number().nullable().optional(),
    ovality: z.number().meta({ description: "Major − minor diameter, in offset units." }),
    ovalityExpandedUncertainty: z.number().nullable().meta({
      description: "By the two-dimensional factor at `level`; null where nothing tells it.",
    }),
    majorClockDeg: z.number().nullable().meta({
      description: "Of the major axis, [0, 180); null where the ovality is within its own uncertainty.",
    }),
  })
  .nullable()
  .meta({
    id: "EllipseAxes",
    description: "For method ellipse; the diameter is then the mean of major and minor.",
  });

export const boreFitStatisticsSchema = z
  .object({
    readingsUsed: z.int(),
    parameters: z.int(),
    rms: z.number().meta({ description: "√(Σr²/n) of the readings in use." }),
    chiSquare: z.number().nullable().meta({
      description: "Σ(r/u)²; null where no uncertainty is stated, and for the limiting circles.",
    }),
    varianceInflation: z.number().nullable().meta({
      description:
        "max(1, χ²/(n − p)), by which the stated variances were enlarged; null where none are stated.",
    }),
    dilution: z.number().meta({
      description:
        "The centre's worst standard uncertainty ÷ that of as many readings, or contacts, evenly round; over 3 warns.",
    }),
    iterations: z.int().meta({ description: "Of a limiting circle: regions of centres compared." }),
  })
  .meta({ id: "BoreFitStatistics" });
