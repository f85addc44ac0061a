import type { Reading } from "../../shared/schemas/job-entries.ts";

const head = [
  "station",
  "form",
  "taken at",
  "person",
  "upper half",
  "closing",
  "seen",
  "sense",
  "zero",
  "nominal diameter (mm)",
  "gauge sag (mm)",
  "clock (deg)",
  "reading (mm)",
  "h (mm)",
  "v (mm)",
];

/** Readings in mm as a spreadsheet of a country with decimal commas writes them: one row a point or an angle. */
export function writeReadingsFile(readings: readonly Reading[]): string {
  const rows = readings.flatMap((reading) => {
    const { station, form, takenAt, person, upperHalf, closing, seen } = reading;
    const who = [station, form, takenAt, person, upperHalf, closing === true ? "yes" : "no", seen];
    switch (reading.form) {
      case "turned_gauge":
        return reading.readings.map(({ clockDeg, reading: read }) => [
          ...who,
          reading.sense,
          reading.zero,
          reading.nominalDiameter,
          reading.gaugeSag,
          clockDeg,
          read,
          undefined,
          undefined,
        ]);
      case "points":
        return reading.points.map(({ h, v }) => [...who, ...Array<undefined>(6).fill(undefined), h, v]);
      case "rotating_target":
      case "wire":
        throw new Error(`A file of ${form} is not written here.`);
    }
  });
  const write = (cell: string | number | null | undefined): string =>
    typeof cell === "number" ? String(cell).replace(".", ",") : (cell ?? "");
  return [head.join(";"), ...rows.map((row) => row.map(write).join(";"))].join("\r\n");
}
