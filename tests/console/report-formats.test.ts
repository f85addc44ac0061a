import { expect, it } from "vitest";
import { reportFormats } from "../../console/src/features/jobs/components/report-formats.ts";
import { reportFormats as served } from "../../server/reports/index.ts";

it("offers every form of a report that the service makes, and no other", () => {
  const offered = reportFormats.map(({ extension }) => extension as string);
  expect(offered.toSorted()).toEqual(served.map(({ extension }) => extension).toSorted());
});
