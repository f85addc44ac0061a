import { describe, expect, it } from "vitest";
import { details, machine, reading, survey } from "../../tests/support/job-entries.ts";
import { seededRandom } from "../../tests/support/seeded-random.ts";
import type { BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import { readJobLog, type JobEntry } from "./job-log.ts";
import { closingId } from "./job-requests.ts";
import { surveyDriftOf } from "./survey-drift.ts";

const opening = reading("found", "brg-1", "2026-11-04T08:00:00Z");
const other = reading("found", "cas-1", "2026-11-04T09:00:00Z");
const closing = reading("found", "brg-1", "2026-11-04T10:00:00Z", { closing: true });

interface Fit {
  readonly at?: readonly [h: number, v: number];
  readonly covariance?: readonly (readonly number[])[] | null;
  readonly dof?: number | null;
}

/** What of a fit the drift is judged by. */
const fit = (id: string, { at: [h, v] = [0, 0], covariance, dof = null }: Fit): BoreFitResult =>
  ({
    id,
    centre: { h, v },
    covariance: covariance === undefined ? round(0.01) : covariance,
    expandedUncertainty: covariance === null ? null : { dof },
  }) as unknown as BoreFitResult;

/** The same standard uncertainty in every direction. */
function round(u: number): number[][] {
  return [
    [u * u, 0],
    [0, u * u],
  ];
}

const driftOf = (
  opened: Fit,
  closed: Fit,
  {
    entries = [opening, other, closing],
    level = 0.95,
    units = machine.units,
  }: {
    readonly entries?: readonly JobEntry[];
    readonly level?: number;
    readonly units?: typeof machine.units;
  } = {},
) => {
  const [state] = readJobLog([details, survey("found", "as_found"), ...entries]).surveys;
  if (!state) throw new Error("The log has a survey.");
  const basis = { machine: { ...machine, units }, details: { ...details.document, level } };
  return surveyDriftOf(basis, state, [
    fit("brg-1", opened),
    fit("cas-1", {}),
    fit(closingId(machine, "brg-1"), closed),
    fit(closingId(machine, "cas-1"), { at: [9, 9] }),
  ]);
};

describe("surveyDriftOf", () => {
  it("is closing less opening, against both uncertainties together", () => {
    const drift = driftOf({ at: [0.1, -0.2] }, { at: [0.11, -0.22] });
    expect(drift?.station).toBe("brg-1");
    expect(Math.abs((drift?.h ?? 1) - 0.01)).toBeLessThan(1e-15); // mm
    expect(Math.abs((drift?.v ?? 1) + 0.02)).toBeLessThan(1e-15); // mm
    // Critical value of chi-square, two degrees of freedom, 0.95: 5.991 (NIST/SEMATECH e-Handbook, 1.3.6.7.4).
    expect(Math.abs((drift?.uncertainty ?? 0) - Math.sqrt(5.991 * 2e-4))).toBeLessThan(2e-6); // mm
  });

  it("exceeds from its uncertainty on, in whichever direction, and in other units alike", () => {
    const bound = driftOf({}, {})?.uncertainty ?? NaN;
    for (const clockDeg of [0, 37, 200]) {
      const at = (radius: number): Fit => ({
        at: [radius * Math.sin((clockDeg * Math.PI) / 180), radius * Math.cos((clockDeg * Math.PI) / 180)],
      });
      expect(driftOf({}, at(bound * 0.999))?.exceeds).toBe(false);
      expect(driftOf({}, at(bound * 1.001))?.exceeds).toBe(true);
      const mil = { units: { ...machine.units, offset: "mil" as const } };
      expect(driftOf({}, at(bound * 0.999), mil)?.exceeds).toBe(false);
      expect(Math.abs((driftOf({}, at(bound * 1.001), mil)?.uncertainty ?? 0) - bound)).toBeLessThan(1e-12); // mil
    }
  });

  it("has the uncertainty of its worst direction", () => {
    const worst = [
      [0.0005, 0.0003],
      [0.0003, 0.0005],
    ];
    // By hand: the eigenvalues of the sum with 1e-4·I are 9e-4 and 3e-4.
    const bound = driftOf({ covariance: worst }, {})?.uncertainty;
    expect(Math.abs((bound ?? 0) - Math.sqrt(5.991464547 * 9e-4))).toBeLessThan(1e-9); // mm
  });

  it("widens where the readings' own scatter is all that is known", () => {
    // Both of four degrees of freedom and one size: eight together (JCGM 100:2008, G.2b). F(0.95; 2, 8) = 4.459
    // (NIST/SEMATECH e-Handbook, 1.3.6.7.3).
    const bound = driftOf({ dof: 4 }, { dof: 4 })?.uncertainty;
    expect(Math.abs((bound ?? 0) / Math.sqrt(2 * 4.459 * 2e-4) - 1)).toBeLessThan(1e-4);
  });

  it("says that it is not known where a reading has no uncertainty", () => {
    expect(driftOf({ at: [5, 5] }, { covariance: null })).toMatchObject({ uncertainty: null, exceeds: null });
  });

  it("is of the first station read, whichever others were read again, and null where none was", () => {
    const early = reading("found", "cas-1", "2026-11-04T09:30:00Z", { closing: true });
    expect(driftOf({}, {}, { entries: [opening, other, early, closing] })?.station).toBe("brg-1");
    expect(driftOf({}, {}, { entries: [opening, other, early] })?.station).toBe("cas-1");
    expect(driftOf({}, {}, { entries: [opening, other] })).toBeNull();
  });

  it("raises as many false alarms as its level says, in drawings with a fixed seed", () => {
    const random = seededRandom(7);
    const drawn = (u: number): Fit => ({
      at: [u * random.normal(), u * random.normal()],
      covariance: round(u),
    });
    const trials = 20_000;
    let alarms = 0;
    for (let trial = 0; trial < trials; trial += 1) {
      if (driftOf(drawn(0.01), drawn(0.02), { level: 0.9 })?.exceeds) alarms += 1;
    }
    // Standard deviation of the share: √(0.9·0.1/20,000) = 0.0021.
    expect(Math.abs(alarms / trials - 0.1)).toBeLessThan(0.007);
  });
});

describe("closingId", () => {
  it("is no station's own id and no longer than one may be, and another for each", () => {
    const ids = ["brg-1", "closing brg-1", "x".repeat(60) + "1", "x".repeat(60) + "2", "closing #0", "#0"];
    const stations = ids.map((id) => ({ id, kind: "bearing" as const, z: 0 }));
    const made = ids.map((id) => closingId({ stations }, id));
    expect(new Set([...ids, ...made]).size).toBe(2 * ids.length);
    for (const id of made) expect(id.length).toBeLessThanOrEqual(64);
    expect(closingId(machine, "cas-1")).toBe("closing cas-1");
  });
});
