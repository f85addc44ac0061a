import type { z } from "zod";
import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import {
  journalSchema,
  rotorMassSchema,
  rotorSchema,
  rotorSupportSchema,
  sectionSchema,
  type JournalRequest,
} from "../../shared/schemas/cold-targets.ts";
import type { Converter } from "../../shared/units.ts";
import { extentOf, leastSupportGapMm } from "../compute/beam/cut-beam.ts";
import { isSamePlace } from "../compute/targets/cold-target-input.ts";
import { materials } from "../compute/targets/materials.ts";
import { combinationInvalid, membersOf, soundOf } from "./common-faults.ts";

/** What could be read of a rotor: null where a part failed its schema. */
interface ReadableRotor {
  readonly z: number | null;
  readonly sections: readonly (z.infer<typeof sectionSchema> | null)[];
  readonly masses: readonly (z.infer<typeof rotorMassSchema> | null)[];
  readonly supports: readonly (z.infer<typeof rotorSupportSchema> | null)[];
  readonly journals: readonly (JournalRequest | null)[];
  readonly sent: Readonly<Record<string, unknown>>;
}

type Place = readonly PropertyKey[];

/** A stretch along z that something must lie on, with the sentence for what does not. */
export interface Extent {
  readonly fromMm: number;
  readonly toMm: number;
  readonly slackMm: number;
  readonly detail: string;
}

/** Every fault of a rotor beyond its schema, of its sound parts where others are not. */
export function rotorFaults(rotor: unknown, axial: Converter): Fault[] {
  const read = readable(rotor);
  const extent = shaftExtent(rotor, axial);
  const onShaft = (list: "masses" | "supports") =>
    extent
      ? read[list].flatMap((one, i) =>
          one ? outsideFault(one.z, ["rotor", list, i, "z"], extent, axial) : [],
        )
      : [];
  return [
    ...read.sections.flatMap((section, i) =>
      section && (section.inner ?? 0) >= section.outer
        ? [
            combinationInvalid(
              ["rotor", "sections", i, "inner"],
              "The inner diameter is below the outer one.",
            ),
          ]
        : [],
    ),
    ...materialFaults(read.sent),
    ...onShaft("masses"),
    ...onShaft("supports"),
    ...supportFaults(read, extent, axial),
    ...journalFaults(read, axial),
  ];
}

/** Where the shaft lies; null where its sections cannot all be read. */
export function shaftExtent(rotor: unknown, axial: Converter): Extent | null {
  const { z, sections } = readable(rotor);
  const lengths = sections.flatMap((section) => (section ? [{ lengthMm: axial.toMm(section.length) }] : []));
  if (z === null || lengths.length === 0 || lengths.length < sections.length) return null;
  return { ...extentOf(axial.toMm(z), lengths), detail: "It lies beyond the ends of the shaft." };
}

/** A fault where `z`, in the axial unit, lies outside an extent. */
export function outsideFault(z: number, at: Place, extent: Extent, axial: Converter): Fault[] {
  const { fromMm, toMm, slackMm, detail } = extent;
  const zMm = axial.toMm(z);
  if (zMm >= fromMm - slackMm && zMm <= toMm + slackMm) return [];
  const { unit } = axial;
  const allowed = { min: axial.fromMm(fromMm), max: axial.fromMm(toMm), unit };
  return [{ pointer: pointerOf(at), code: "out_of_range", detail, value: z, unit, allowed }];
}

function readable(rotor: unknown): ReadableRotor {
  const sent = membersOf(rotor);
  return {
    z: rotorSchema.shape.z.safeParse(sent["z"]).success
      ? ((sent["z"] as number | null | undefined) ?? 0)
      : null,
    sections: soundOf(sectionSchema, sent["sections"]),
    masses: soundOf(rotorMassSchema, sent["masses"]),
    supports: soundOf(rotorSupportSchema, sent["supports"]),
    journals: soundOf(journalSchema, sent["journals"]),
    sent,
  };
}

/** Density and modulus that neither the call nor its material gives. */
function materialFaults({ material, density, modulus }: ReadableRotor["sent"]): Fault[] {
  const known = rotorSchema.shape.material.safeParse(material);
  if (!known.success) return [];
  const table = known.data ? materials[known.data] : null;
  const detail = (what: string) =>
    table
      ? `The table gives no ${what} for this material: state it.`
      : `State ${what}, or a material that has it.`;
  return [
    ...((density ?? table?.densityKgPerM3 ?? null) === null
      ? [{ pointer: "/rotor/density", code: "required" as const, detail: detail("density") }]
      : []),
    ...((modulus ?? table?.modulusGPa ?? null) === null
      ? [{ pointer: "/rotor/modulus", code: "required" as const, detail: detail("modulus") }]
      : []),
  ];
}

/** Supports that stand at one place, or are too few to hold a shaft. */
function supportFaults({ supports, sent }: ReadableRotor, extent: Extent | null, axial: Converter): Fault[] {
  const gapMm = extent ? leastSupportGapMm(extent.toMm - extent.fromMm) : 0;
  // Sorted, so that neighbours are compared alone; the later sent of two is the one at fault.
  const placed = supports
    .flatMap((support, index) => (support ? [{ index, zMm: axial.toMm(support.z) }] : []))
    .sort((a, b) => a.zMm - b.zMm || a.index - b.index);
  const repeated = placed.flatMap(({ index, zMm }, i) => {
    const before = placed[i - 1];
    const same = before && (zMm - before.zMm <= gapMm || isSamePlace(zMm, before.zMm));
    return same ? [Math.max(index, before.index)] : [];
  });
  const apart = supports.length - new Set(repeated).size;
  return [
    ...repeated
      .sort((a, b) => a - b)
      .map((index) =>
        combinationInvalid(
          ["rotor", "supports", index, "z"],
          "Another support stands at this place of the shaft.",
        ),
      ),
    ...(Array.isArray(sent["supports"]) && apart < 2
      ? [
          {
            pointer: "/rotor/supports",
            code: "shaft_unsupported" as const,
            detail: "A shaft lies on two or more supports apart from each other.",
          },
        ]
      : []),
  ];
}

/** Journals at no support, or two at one. */
function journalFaults({ journals, supports }: ReadableRotor, axial: Converter): Fault[] {
  const supportsKnown = supports.every((support) => support !== null);
  const at = (one: { readonly z: number } | null) => (one ? axial.toMm(one.z) : NaN);
  return journals.flatMap((journal, index) => {
    const place = ["rotor", "journals", index, "z"];
    const zMm = at(journal);
    if (!journal) return [];
    if (journals.slice(0, index).some((earlier) => isSamePlace(at(earlier), zMm))) {
      return [combinationInvalid(place, "An earlier journal runs in this support.")];
    }
    if (!supportsKnown || supports.some((support) => isSamePlace(at(support), zMm))) return [];
    const detail = "No support of the rotor stands at this z.";
    return [{ pointer: pointerOf(place), code: "unknown_reference", detail, value: journal.z }];
  });
}
