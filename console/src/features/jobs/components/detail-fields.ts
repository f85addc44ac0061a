import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";

/** What stands of a job beside its surveys, in words. What is not stated is left out. */
export function detailFields({ details, machine }: JobRecord): { name: string; value: string }[] {
  const axis = details.axis ?? { method: "least_squares" as const, through: machine.reference ?? [] };
  const through = axis.through ?? [];
  const fields: [string, string | null | undefined][] = [
    ["readers look", details.seen],
    [
      "axis",
      `${axis.method.replaceAll("_", " ")}${through.length > 0 ? ` through ${through.join(", ")}` : ""}`,
    ],
    ["level of uncertainties", String(details.level ?? 0.95)],
    ["verdicts", details.verdict?.rule ?? "guarded"],
    ["people", (details.people ?? []).map(({ name, role }) => `${name}, ${role}`).join("\n")],
    [
      "instruments",
      (details.instruments ?? [])
        .map(({ id, description, calibrationDueOn, readingUncertainty }) =>
          [
            `${id}, ${description}`,
            ...(calibrationDueOn ? [`calibration due ${calibrationDueOn}`] : []),
            ...(readingUncertainty ? [`u ${readingUncertainty} ${machine.units.offset}`] : []),
          ].join(", "),
        )
        .join("\n"),
    ],
    ["remarks", details.remarks],
  ];
  return fields.flatMap(([name, value]) => (value ? [{ name, value }] : []));
}
