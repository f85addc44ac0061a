import type { CrossedStudy } from "../compute/repeatability/crossed-study.ts";
import type { Repeats } from "../compute/repeatability/describe-repeats.ts";
import type { ShareOfTolerance } from "../compute/repeatability/share-of-tolerance.ts";
import { isNegative } from "../compute/repeatability/variance-components.ts";
import { studentFactor } from "../compute/statistics/student-t.ts";

interface Warning {
  code: string;
  detail: string;
}

const planes = ["h", "v"] as const;
/** Neighbours are looked at from so many readings on: with fewer, chance makes any correlation. */
const neighboursFrom = 8;
/** Per cent of tolerance above which readings cannot judge it (common guideline of gauge studies, AIAG). */
const shareMax = 30;

/** What the reader of repeat readings must know before using their scatter. */
export function repeatsWarnings(
  { drift, autocorrelation, farthest, flat, atNumberResolution }: Repeats,
  count: number,
  level: number,
  share: ShareOfTolerance | null,
): Warning[] {
  // Large-lag limit z/√n (NIST/SEMATECH e-Handbook 1.3.3.1, from memory).
  const limit = studentFactor(level, null) / Math.sqrt(count);
  const correlated = planes.filter(
    (plane) => count >= neighboursFrom && Math.abs(autocorrelation[plane] ?? 0) > limit,
  );
  const drifting = planes.filter((plane) => drift?.[plane].significant);
  return [
    ...(drifting.length > 0 || drift?.together?.significant
      ? [
          warning(
            "readings_drift",
            `The readings drift${inPlanes(drifting)}: their mean is not one place, and s/√n is too small for its uncertainty.`,
          ),
        ]
      : []),
    ...(correlated.length > 0
      ? [
          warning(
            "readings_correlated",
            `Neighbouring readings resemble each other${inPlanes(correlated)}: they are fewer than they look, and the uncertainty of their mean is larger than s/√n.`,
          ),
        ]
      : []),
    ...planes.flatMap((plane) => {
      const reading = farthest[plane];
      return reading?.standsOut
        ? [
            warning(
              "reading_stands_out",
              `Reading ${reading.index} lies ${reading.ratio.toPrecision(3)} standard deviations off in ${plane}, more than chance allows (${reading.limit.toPrecision(3)}). It was kept.`,
            ),
          ]
        : [];
    }),
    ...flatWarnings(flat),
    ...(atNumberResolution.length > 0
      ? [
          warning(
            "readings_at_number_resolution",
            `The scatter${inPlanes(atNumberResolution)} is near the spacing of numbers of that size: send readings from a nearer origin.`,
          ),
        ]
      : []),
    ...shareWarnings(share),
  ];
}

/** What the reader of a crossed study must know before using its components. */
export function crossedWarnings(
  { components, table, dof }: CrossedStudy,
  share: ShareOfTolerance | null,
): Warning[] {
  const negative = (["interaction", "person", "station"] as const).filter((name) =>
    isNegative(components[name]),
  );
  const flat = planes.filter((plane) =>
    table[plane].some(({ name, sumOfSquaresMm2 }) => name === "repeatability" && sumOfSquaresMm2 === 0),
  );
  const fewDof = planes.filter((plane) => (dof.reading[plane] ?? Infinity) < 5);
  return [
    ...(negative.length > 0
      ? [
          warning(
            "component_below_zero",
            `Chance made the estimate for ${negative.join(", ")} come out below 0 in h or v; 0 stands for it.`,
          ),
        ]
      : []),
    ...flatWarnings(flat),
    ...(fewDof.length > 0
      ? [
          warning(
            "few_degrees_of_freedom",
            `What one reading by anybody is worth${inPlanes(fewDof)} rests on fewer than 5 degrees of freedom: more people would tell it better than more repeats.`,
          ),
        ]
      : []),
    ...shareWarnings(share),
  ];
}

function flatWarnings(flat: readonly string[]): Warning[] {
  if (flat.length === 0) return [];
  const detail = `Repeats do not vary${inPlanes(flat)}: the instrument's step hides what they would tell, and 0 is a limit, not a finding.`;
  return [warning("no_scatter", detail)];
}

function shareWarnings(share: ShareOfTolerance | null): Warning[] {
  const most = share ? Math.max(...Object.values(share).map(Number)) : 0;
  if (most <= shareMax) return [];
  const detail = `The scatter of a reading takes ${most.toPrecision(3)} % of the tolerance: over ${shareMax} % a reading cannot judge it (common guideline of gauge studies).`;
  return [warning("tolerance_taken_by_readings", detail)];
}

const inPlanes = (names: readonly string[]): string => (names.length > 0 ? ` in ${names.join(" and ")}` : "");

const warning = (code: string, detail: string): Warning => ({ code, detail });
