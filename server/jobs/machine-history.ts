import { isDeepStrictEqual } from "node:util";
import type { ConfirmationRequest } from "../../shared/schemas/confirmations.ts";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import type { JobSurvey } from "../../shared/schemas/job-surveys.ts";
import type { MachineHistory } from "../../shared/schemas/machine-history.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import { convertLength } from "../../shared/figures/write-number.ts";
import { confirmationKind } from "../calculations/confirmation.ts";
import { isDefinite } from "../compute/confirmation/survey-change.ts";

type History = MachineHistory["stations"][number];
type Place = NonNullable<History["outages"][number]["asFound"]>;

/** Coverage of every drift test: of twenty stations that did not move, one fails by chance. */
const level = 0.95;

/** One outage, in the offset unit of the newest revision: where each station was found, and where it was left. */
interface Outage {
  readonly record: JobRecord;
  readonly found: ReadonlyMap<string, Measured>;
  readonly left: ReadonlyMap<string, Measured>;
  readonly reference: ReadonlySet<string>;
}
interface Measured extends Place {
  readonly dof: number | null;
}

/**
 * Every station of a machine over its outages, and what it drifted between them. Positions are off each outage's own
 * axis (deviation + target), so that a new set-up of the instrument is no drift; a change is tested as the vector it is,
 * by the same test as POST /v1/confirmations. Outages stand in the order of their readings; records without a computed
 * survey are passed over.
 */
export function historyOf(
  { id, document }: { readonly id: string; readonly document: MachineDocument },
  records: readonly JobRecord[],
  more: boolean,
): MachineHistory {
  const outages = records
    .filter(({ surveys }) => surveys.some(({ result }) => result))
    .map((record) => readOutage(record, document))
    .sort((one, other) => Date.parse(lastReading(one.record)) - Date.parse(lastReading(other.record)));
  const pairs = outages.slice(1).map((to, index) => driftsBetween(outages[index], to, document));
  return {
    machineId: id,
    units: document.units,
    level,
    more,
    outages: outages.map(({ record }) => ({
      jobId: record.id,
      title: record.title,
      state: record.state,
      at: lastReading(record),
      machineRevision: record.machineRevision,
    })),
    stations: document.stations.map((station) => ({
      id: station.id,
      label: station.label ?? null,
      z: station.z,
      outages: outages.map(({ record, found, left, reference }) => ({
        jobId: record.id,
        reference: reference.has(station.id),
        asFound: placeOf(found.get(station.id)),
        asLeft: placeOf(left.get(station.id)),
      })),
      drifts: pairs.flatMap((drifts) => drifts.get(station.id) ?? []),
    })),
  };
}

function readOutage(record: JobRecord, newest: MachineDocument): Outage {
  const computed = record.surveys.filter(({ result }) => result);
  const founds = computed.filter(({ survey }) => survey.stage === "as_found");
  const lefts = computed.filter(({ survey }) => survey.stage === "as_left");
  // Nothing was moved where there is no as-left survey: the machine was left as it was found.
  const isUntouched = record.moves.length === 0 && lefts.length === 0;
  const found = placesOf(founds, record, newest);
  return {
    record,
    found,
    left: isUntouched ? found : placesOf(lefts, record, newest),
    reference: new Set(computed.flatMap(({ result }) => result?.axis.through ?? [])),
  };
}

/** Of each station its latest place in these surveys. */
function placesOf(
  surveys: readonly JobSurvey[],
  { machine }: JobRecord,
  newest: MachineDocument,
): Map<string, Measured> {
  const scale = convertLength(1, machine.units.offset, newest.units.offset);
  const places = new Map<string, Measured>();
  for (const { id: survey, result } of surveys) {
    for (const { id, deviation, covariance, verdict, expandedUncertainty } of result?.stations ?? []) {
      const target = machine.stations.find((station) => station.id === id)?.target ?? { h: 0, v: 0 };
      places.set(id, {
        survey,
        position: { h: scale * (deviation.h + target.h), v: scale * (deviation.v + target.v) },
        deviation: {
          h: scale * deviation.h,
          v: scale * deviation.v,
          radial: scale * deviation.radial,
          clockDeg: deviation.clockDeg,
        },
        covariance: covariance?.map((row) => row.map((cell) => scale * scale * cell)) ?? null,
        verdict,
        dof: expandedUncertainty?.dof ?? null,
      });
    }
  }
  return places;
}

function driftsBetween(
  from: Outage | undefined,
  to: Outage,
  newest: MachineDocument,
): Map<string, History["drifts"]> {
  const shared = newest.stations.filter(({ id }) => from?.left.has(id) && to.found.has(id));
  if (!from || shared.length === 0) return new Map();
  const survey = (places: ReadonlyMap<string, Measured>): ConfirmationRequest["before"] => ({
    stations: shared.map(({ id, z }) => {
      const { position, covariance, dof } = places.get(id) as Measured;
      return { id, z, centre: position, covariance: testable(covariance), dof };
    }),
  });
  const { axial, bore, offset } = newest.units;
  const compared: { result: ConfirmationResult } = confirmationKind.answer({
    units: { axial, bore, offset },
    level,
    before: survey(from.left),
    after: survey(to.found),
    sameSetUp: true,
  });
  return new Map(
    compared.result.unmoved.map(({ id, change, covariance, statistic, limit, changed }) => [
      id,
      [
        {
          from: from.record.id,
          to: to.record.id,
          change,
          covariance,
          statistic,
          limit,
          changed,
          reference: from.reference.has(id) || to.reference.has(id),
          targetChanged: !isDeepStrictEqual(targetOf(from.record, id), targetOf(to.record, id)),
        },
      ],
    ]),
  );
}

/**
 * A station that set a two-station axis lies on it by definition: its covariance is 0, and its drift is
 * not tested.
 */
function testable(covariance: Place["covariance"]): Place["covariance"] {
  const [[hh = Number.NaN, hv = Number.NaN] = [], [, vv = Number.NaN] = []] = covariance ?? [];
  return isDefinite({ hhMm2: hh, hvMm2: hv, vvMm2: vv }) ? covariance : null;
}

function targetOf({ machine }: JobRecord, id: string): unknown {
  return machine.stations.find((station) => station.id === id)?.target ?? null;
}

function placeOf(measured: Measured | undefined): Place | null {
  if (!measured) return null;
  const { dof: _dof, ...place } = measured;
  return place;
}

function lastReading({ surveys, createdAt }: JobRecord): string {
  const taken = surveys.flatMap(({ readings }) => readings.map(({ reading }) => Date.parse(reading.takenAt)));
  return taken.length === 0 ? createdAt : new Date(Math.max(...taken)).toISOString();
}
