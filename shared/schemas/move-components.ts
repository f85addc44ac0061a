import { z } from "zod";
import { bounds, limits } from "../limits.ts";
import { callerId, clockDeg, quantity } from "./quantity.ts";

const thickness = (description: string) => quantity("offset", "thickness", description);

export const stackSchema = z
  .strictObject({
    thickness: thickness("As it stands. 0 holds no piece."),
    min: thickness("Least when done; 0 when absent.").optional(),
    max: thickness("Most when done; unlimited when absent.").nullish(),
    maxCount: z
      .number()
      .int()
      .min(0)
      .max(1_000)
      .meta({ description: "Pieces in the finished stack, all counted; unlimited when absent." })
      .nullish(),
    shims: z
      .array(quantity("offset", "shim", "One piece."))
      .max(limits.piecesPerStack)
      .meta({
        description:
          "The pieces, which add up to the thickness. Absent: not known; the stack is then one piece, kept and added to, or taken out whole.",
      })
      .nullish(),
  })
  .meta({ id: "ShimStack" });

const plane = z.enum(["h", "v"]);
const travelRange = z
  .array(quantity("offset", "offset", "Least and most."))
  .min(2)
  .max(2);
const position = {
  id: callerId,
  z: quantity("axial", "coordinate", "Of the support."),
  blocked: z
    .array(plane)
    .max(2)
    .meta({ description: "Directions in which the support cannot move; none when absent." })
    .optional(),
  travel: z
    .strictObject({ h: travelRange.optional(), v: travelRange.optional() })
    .meta({ id: "Travel", description: "Least and most move from now; unlimited when absent." })
    .optional(),
};

const feetSupport = z
  .strictObject({
    ...position,
    form: z.literal("feet"),
    stacks: z
      .strictObject({
        left: stackSchema.optional(),
        right: stackSchema.optional(),
        "key-left": stackSchema.optional(),
        "key-right": stackSchema.optional(),
      })
      .meta({
        id: "FeetStacks",
        description:
          "Both feet or neither. Without key stacks h is set by jack and locked; without foot stacks, v.",
      })
      .optional(),
    keys: z
      .enum(["outside", "inside"])
      .meta({
        description:
          "Where the side keys stand. outside (default): key-left is thickened by +h, key-right by −h; inside: swapped.",
      })
      .optional(),
  })
  .meta({ id: "FeetSupport" });

const jointKeysSupport = z
  .strictObject({
    ...position,
    form: z.literal("joint_keys"),
    stacks: z
      .strictObject({
        "key-left": stackSchema.optional(),
        "key-right": stackSchema.optional(),
        "key-bottom": stackSchema.optional(),
      })
      .meta({
        id: "JointKeyStacks",
        description:
          "key-left and key-right at the horizontal joint set the height (both or neither). key-bottom sets the side: its stack is the one at the left cheek.",
      })
      .optional(),
  })
  .meta({ id: "JointKeysSupport" });

const padsSupport = z
  .strictObject({
    ...position,
    form: z.literal("pads"),
    pads: z
      .array(
        z
          .strictObject({
            id: callerId,
            clockDeg,
            stack: stackSchema,
          })
          .meta({ id: "Pad" }),
      )
      .min(1)
      .max(limits.padsPerSupport)
      .meta({ description: "Pads at 90 to 270 degrees bear load; the others follow the realised move." }),
  })
  .meta({ id: "PadsSupport" });

export const supportSchema = z
  .discriminatedUnion("form", [feetSupport, padsSupport, jointKeysSupport])
  .meta({ id: "Support" });

const tiltTolerance = z
  .strictObject({ h: tiltSide(), v: tiltSide() })
  .meta({ id: "TiltTolerance", description: "Half-widths." });

function tiltSide() {
  return z.number().min(bounds.tilt.min).max(bounds.tilt.max);
}

export const componentSchema = z
  .strictObject({
    id: callerId,
    kind: z
      .enum(["casing", "shroud", "nozzle", "bearing", "other"])
      .meta({ description: "Bearings are moved after all others; other when absent." })
      .optional(),
    stations: z
      .array(callerId)
      .max(limits.stationsPerCall)
      .meta({ description: "Ids of the stations that the part carries. A station belongs to one component." })
      .optional(),
    fixed: z.boolean().meta({ description: "The part may not move." }).optional(),
    allowReferenceMove: z
      .boolean()
      .meta({ description: "A part that holds a reference station stays, unless this is true." })
      .optional(),
    supports: z
      .array(supportSchema)
      .max(limits.supportsPerComponent)
      .meta({ description: "One or more, unless the part is fixed." })
      .optional(),
    carriedBy: callerId
      .nullable()
      .meta({
        description:
          "Id of the component that this one rests in: its stations follow that one's move before its own.",
      })
      .optional(),
    tilt: z
      .strictObject({ tolerance: tiltTolerance })
      .nullable()
      .meta({
        description:
          "Tolerance of the slope of the line through the part's end stations, offset units per axial unit; a tilt beyond it counts like a station beyond its own.",
      })
      .optional(),
    roll: z
      .strictObject({
        radians: z
          .number()
          .min(bounds.rollRadians.min)
          .max(bounds.rollRadians.max)
          .meta({ description: "Measured; clockwise positive, seen downstream." }),
        feet: z
          .array(
            z.strictObject({
              support: callerId,
              place: callerId,
              h: quantity("offset", "offset", "From the bore's centre, to the right."),
              v: quantity("offset", "offset", "From the bore's centre, up."),
            }),
          )
          .min(2)
          .max(limits.supportsPerComponent * 2)
          .meta({ description: "The feet, or the keys at the joint, that carry the part's height." }),
      })
      .nullable()
      .meta({
        description:
          "A measured roll, taken out by unlike changes of the feet: the bore then moves by roll × height.",
      })
      .optional(),
  })
  .meta({ id: "MoveComponent", description: "One rigid part." });

export type ComponentRequest = z.infer<typeof componentSchema>;
export type SupportRequest = z.infer<typeof supportSchema>;
export type StackRequest = z.infer<typeof stackSchema>;
