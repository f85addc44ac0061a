import { writeNumber, writeSigned, decimalsAcross } from "../../../../../shared/figures/write-number.ts";
import type { IndicationAnswer } from "../../../../../shared/schemas/indications.ts";
import type { JobRecord } from "../../../../../shared/schemas/jobs.ts";
import { readDecimal } from "../../../lib/read-decimal.ts";
import { textOf } from "../../../lib/read-form.ts";
import type { JobPlan } from "./move-view.ts";

export interface IndicatorField {
  readonly id: string;
  readonly hint: string;
}
export interface SightField {
  readonly station: string;
  /** Of the component itself; else a neighbour to be watched. */
  readonly own: boolean;
  readonly hints: { readonly h: string | undefined; readonly v: string | undefined };
}

/** What can be read while a component moves: its indicators, its own stations and the neighbours to be watched. */
export function readingFields(
  { machine, surveys }: Pick<JobRecord, "machine" | "surveys">,
  plan: JobPlan,
  component: string,
): { indicators: IndicatorField[]; sights: SightField[] } {
  const { offset, axial } = machine.units;
  const decimals = decimalsAcross(offset);
  const step = plan.result.steps.find((one) => one.component === component);
  const own = machine.components?.find(({ id }) => id === component)?.stations ?? [];
  const watched = new Set([...own, ...(step?.watch ?? []).map(({ station }) => station)]);
  const result = surveys.find(({ id }) => id === plan.survey)?.result;
  // Another result than the plan's would give other figures to go by.
  const fits = plan.current ? (result?.fits ?? []) : [];
  const aim = (station: string, plane: "h" | "v"): string | undefined => {
    const found = fits.find(({ id }) => id === station)?.centre[plane];
    if (found === undefined) return undefined;
    const before = plan.from.stations.find(({ id }) => id === station)?.deviation[plane];
    const after = plan.result.predicted.find(({ id }) => id === station)?.deviation[plane];
    const goal =
      own.includes(station) && before !== undefined && after !== undefined ? found + after - before : null;
    return `found ${writeSigned(found, decimals)}${goal === null ? "" : `, to ${writeSigned(goal, decimals)}`}`;
  };
  return {
    indicators: (machine.indicators ?? [])
      .filter((one) => one.component === component)
      .map(({ id, clockDeg, z, contact }) => {
        const parts = (step?.increments ?? []).flatMap(({ indicators }) =>
          indicators.filter((one) => one.id === id).map(({ reading }) => writeSigned(reading, decimals)),
        );
        const place = `${writeNumber(clockDeg, 0)}\u00b0, z ${z} ${axial}${contact === "inside" ? ", inside" : ""}`;
        return { id, hint: parts.length === 0 ? place : `${place}; planned ${parts.join(", then ")}` };
      }),
    sights: machine.stations
      .filter(({ id }) => watched.has(id))
      .map(({ id }) => ({ station: id, own: own.includes(id), hints: { h: aim(id, "h"), v: aim(id, "v") } })),
  };
}

/** Names of the fields of a form. */
export const fieldNames = {
  indicator: (id: string): string => `indicator ${id}`,
  sight: (station: string, plane: "h" | "v"): string => `sight ${plane} ${station}`,
};

/** What was typed, as the service takes it. A sight with one of its two numbers has null for the other, and is refused. */
export function indicationFrom(
  data: FormData,
  { indicators, sights }: ReturnType<typeof readingFields>,
  head: { readonly plan: string; readonly component: string; readonly at: string },
) {
  const read = (name: string) => readDecimal(textOf(data, name));
  const readings = indicators.flatMap(({ id }) => {
    const reading = read(fieldNames.indicator(id));
    return reading === null ? [] : [{ id, reading }];
  });
  const seen = sights.flatMap(({ station }) => {
    const centre = { h: read(fieldNames.sight(station, "h")), v: read(fieldNames.sight(station, "v")) };
    return centre.h === null && centre.v === null ? [] : [{ station, centre }];
  });
  const person = textOf(data, "person").trim();
  return {
    ...head,
    ...(person === "" ? {} : { person }),
    ...(readings.length === 0 ? {} : { indicators: readings }),
    ...(seen.length === 0 ? {} : { sights: seen }),
  };
}

/** What was read, in words, for the list of the last readings. */
export function wordsOfReading(
  { indicators, sights }: Pick<IndicationAnswer, "indicators" | "sights">,
  decimals: number,
): string[] {
  return [
    ...indicators.map(({ id, reading }) => `${id} ${writeSigned(reading, decimals)}`),
    ...sights.map(
      ({ station, centre }) =>
        `${station} h ${writeSigned(centre.h, decimals)} v ${writeSigned(centre.v, decimals)}`,
    ),
  ];
}
