import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import type { ConfirmationRequest } from "../../shared/schemas/confirmations.ts";
import type { Units } from "../../shared/units.ts";
import { confirmed as base, surveyOf } from "../../tests/support/confirmation-requests.ts";
import { confirmationKind } from "./confirmation.ts";

const confirm = (request: ConfirmationRequest): ConfirmationResult => confirmationKind.answer(request).result;

/** Exact by definition (international inch, 1959), stated here so that the service's own table is not its own witness. */
const millimetresPer = { mm: 1, um: 0.001, m: 1000, in: 25.4, mil: 0.0254, ft: 304.8 };

function inUnits(request: ConfirmationRequest, units: Units): ConfirmationRequest {
  const [offset, axial] = [millimetresPer[units.offset], millimetresPer[units.axial]];
  const survey = ({ stations }: ConfirmationRequest["after"]) => ({
    stations: stations.map((station) => ({
      ...station,
      z: station.z / axial,
      centre: { h: station.centre.h / offset, v: station.centre.v / offset },
      covariance: station.covariance!.map((row) => row.map((cell) => cell / offset / offset)),
      tolerance: { radial: 0.15 / offset },
    })),
  });
  return {
    ...request,
    units,
    before: survey(request.before),
    after: survey(request.after),
    components: request.components!.map((part) => ({
      ...part,
      supports: part.supports!.map(({ id, z }) => ({ id, z: z / axial })),
    })),
    moves: request.moves!.map((move) => ({ ...move, h: move.h / offset, v: move.v / offset })),
  };
}

describe("confirmationKind.answer, in any unit", () => {
  const whole = [
    [0.3, -0.2],
    [-3e-5, 2e-5],
  ] as const;
  const request = { ...base, after: surveyOf({ "cas-1": [-0.1, 0.05], "noz-1": [0, 0.05] }, whole) };
  const wanted = confirm(request);
  it.each([
    { axial: "m", bore: "mm", offset: "um" },
    { axial: "in", bore: "in", offset: "mil" },
    { axial: "ft", bore: "in", offset: "in" },
  ] as const)("says the same in $axial and $offset", (units) => {
    const got = confirm(inUnits(request, units));
    const [offset, axial] = [millimetresPer[units.offset], millimetresPer[units.axial]];
    const near = (one: number, other: number) =>
      expect(Math.abs(one - other)).toBeLessThan(1e-9 * (1 + Math.abs(other)));
    expect([got.reference.cause, got.unexpected, got.outstanding]).toEqual([
      wanted.reference.cause,
      wanted.unexpected,
      wanted.outstanding,
    ]);
    near(got.reference.shift!.h * offset, wanted.reference.shift!.h);
    near((got.reference.tilt!.h * offset) / axial / 1e-5, wanted.reference.tilt!.h / 1e-5);
    got.moved.forEach((station, i) => {
      near(station.achieved!.h * offset, wanted.moved[i]!.achieved!.h);
      near(station.ratio!, wanted.moved[i]!.ratio!);
      expect(Math.abs(station.statistic! - wanted.moved[i]!.statistic!)).toBeLessThan(1e-6);
      near(station.covariance![0]![1]! * offset * offset * 1e6, wanted.moved[i]!.covariance![0]![1]! * 1e6);
    });
    expect(got.verdicts.map(({ verdict }) => verdict)).toEqual(wanted.verdicts.map(({ verdict }) => verdict));
  });
});

describe("confirmationKind.answer, whatever is sent", () => {
  it("answers with finite numbers or refuses by a code", () => {
    const size = fc.double({ min: -1e9, max: 1e9, noNaN: true });
    const variance = fc.double({ min: 1e-20, max: 1e18, noNaN: true });
    const station = fc.record({ h: size, v: size, hh: variance, vv: variance, z: size });
    fc.assert(
      fc.property(
        fc.array(fc.tuple(station, station), { minLength: 2, maxLength: 6 }),
        fc.boolean(),
        (pairs, sameSetUp) => {
          const survey = (which: 0 | 1) => ({
            stations: pairs.map((pair, i) => ({
              id: `s${i}`,
              z: pair[0].z,
              centre: { h: pair[which].h, v: pair[which].v },
              covariance: [
                [pair[which].hh, 0],
                [0, pair[which].vv],
              ],
            })),
          });
          const request: ConfirmationRequest = {
            units: base.units,
            sameSetUp,
            before: survey(0),
            after: survey(1),
            reference: pairs.slice(1).map((_, i) => `s${i}`),
          };
          try {
            const text = JSON.stringify(confirm(request), (_, value: unknown) =>
              typeof value === "number" && !Number.isFinite(value) ? "not finite" : value,
            );
            expect(text).not.toContain("not finite");
          } catch (error) {
            expect(error).toMatchObject({
              name: expect.stringMatching(/^(CalculationRefusal|ComputeError)$/) as string,
            });
          }
        },
      ),
      { numRuns: 300 },
    );
  });

  it("takes two thousand stations, all of them reference, in a time that a caller can wait for", () => {
    const survey = (by: number) => ({
      stations: Array.from({ length: 2_000 }, (_, i) => ({
        id: `s${i}`,
        z: i,
        centre: { h: by * ((i % 7) - 3), v: 0 },
        covariance: [
          [1e-4, 0],
          [0, 1e-4],
        ],
        dof: 20,
      })),
    });
    const request: ConfirmationRequest = {
      units: base.units,
      sameSetUp: false,
      before: survey(0),
      after: survey(1e-3),
      reference: survey(0).stations.map(({ id }) => id),
    };
    expect(confirmationKind.isLong!(request)).toBe(true);
    expect(confirm(request).reference.repeats).toBe(true);
    const { reference } = confirm({ ...request, after: survey(1) });
    expect(reference).toMatchObject({ repeats: false, cause: "several" });
  });
});
