import type { AxisDeviationRequest, AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { BoreFitRequest, BoreFitResult, BoreRequest } from "../../shared/schemas/bore-fits.ts";
import type { ConfirmationRequest } from "../../shared/schemas/confirmations.ts";
import type { JobDetails, Reading } from "../../shared/schemas/job-entries.ts";
import { limits } from "../../shared/limits.ts";
import { plannedBoreMoves } from "../../shared/planned-move.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { ShimMoveRequest, ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import type { Units } from "../../shared/units.ts";
import { countingReadings, type JobEntry, type JobState, type SurveyState } from "./job-log.ts";

/** What every request of a job starts from. */
export interface JobBasis {
  readonly machine: MachineDocument;
  readonly details: JobDetails;
}

/** The ids of the stations that set the axis. */
export function axisStations({ machine, details }: JobBasis): readonly string[] {
  return axisOf({ machine, details }).through ?? [];
}

/**
 * The id under which a closing reading is fitted, beside the opening one of the same station: no station's own, and no
 * longer than an id may be.
 */
export function closingId({ stations }: Pick<MachineDocument, "stations">, station: string): string {
  const taken = new Set(stations.flatMap(({ id }) => [id, `closing ${id}`]));
  const plain = `closing ${station}`;
  if (plain.length <= limits.idLength && !stations.some(({ id }) => id === plain)) return plain;
  const place = stations.findIndex(({ id }) => id === station);
  for (let mark = "#"; ; mark += "#") {
    const id = `closing ${mark}${place}`;
    if (!taken.has(id)) return id;
  }
}

/** One reading as a bore of POST /v1/bore-fits. */
export function boreOf({ machine }: JobBasis, reading: Reading): BoreRequest {
  const {
    station,
    takenAt: _at,
    person: _by,
    upperHalf: _half,
    instrument: _with,
    closing,
    ...read
  } = reading;
  const id = closing ? closingId(machine, station) : station;
  if (read.form !== "turned_gauge") return { ...read, id };
  const drawn = machine.stations.find((one) => one.id === station)?.nominalDiameter;
  // 0 is no diameter: the engine's own schema refuses it and says what is missing.
  return { ...read, id, nominalDiameter: read.nominalDiameter ?? drawn ?? 0 };
}

/** A survey's readings that count, as one call; each with the instrument's uncertainty where it states none. */
export function boreFitRequestOf(basis: JobBasis, survey: SurveyState, note: string): BoreFitRequest {
  const { opening, closing } = countingReadings(survey);
  return boreFitCall(
    basis,
    [...opening, ...closing].map(({ document }) => document.reading),
    survey.entry.document.instrument ?? null,
    note,
  );
}

/** Readings as one call of POST /v1/bore-fits. */
export function boreFitCall(
  basis: JobBasis,
  readings: readonly Reading[],
  surveyInstrument: string | null,
  note: string | null,
): BoreFitRequest {
  const { machine, details } = basis;
  const statedBy = new Map(
    (details.instruments ?? []).map(({ id, readingUncertainty }) => [id, readingUncertainty ?? null]),
  );
  return {
    units: machine.units,
    seen: details.seen,
    ...levelOf(details),
    bores: readings.map((reading) => {
      const bore = boreOf(basis, reading);
      const instrument = reading.instrument ?? surveyInstrument;
      const stated = instrument === null ? null : (statedBy.get(instrument) ?? null);
      return stated === null || bore.readingUncertainty ? bore : { ...bore, readingUncertainty: stated };
    }),
    note,
  };
}

/** The centres fitted, against the machine's targets. Closing readings set no centre. */
export function axisRequestOf(
  { machine, details }: JobBasis,
  fits: readonly BoreFitResult[],
  note: string,
): AxisDeviationRequest {
  const fitOf = new Map(fits.map((fit) => [fit.id, fit]));
  return {
    units: lengthUnits(machine.units),
    ...levelOf(details),
    axis: axisOf({ machine, details }),
    ...(details.verdict ? { verdict: details.verdict } : {}),
    stations: machine.stations.flatMap(({ id, z, target, targetUncertainty, tolerance }) => {
      const fit = fitOf.get(id);
      if (!fit) return [];
      const { centre, covariance, expandedUncertainty } = fit;
      const dof = expandedUncertainty?.dof ?? null;
      return [{ id, z, centre, covariance, dof, target, targetUncertainty, tolerance }];
    }),
    note,
  };
}

/** The deviations of a survey, on the machine's supports and shims. */
export function moveRequestOf(
  { machine, details }: JobBasis,
  stations: AxisDeviationResult["stations"],
  objective: JobDetails["objective"],
  note: string | null,
): ShimMoveRequest {
  const measured = new Set(stations.map(({ id }) => id));
  const toleranceOf = new Map(machine.stations.map(({ id, tolerance }) => [id, tolerance ?? null]));
  const components = (machine.components ?? []).map((component) => ({
    ...component,
    stations: (component.stations ?? []).filter((id) => measured.has(id)),
  }));
  const { couplings, indicators, shims, maximumIncrement, maximumMisfit } = machine;
  const wanted = objective ?? details.objective;
  return {
    units: lengthUnits(machine.units),
    ...levelOf(details),
    stations: stations.map(({ id, z, deviation: { h, v }, covariance, expandedUncertainty }) => ({
      id,
      z,
      deviation: { h, v },
      covariance,
      dof: expandedUncertainty?.dof ?? null,
      tolerance: toleranceOf.get(id) ?? null,
    })),
    reference: axisStations({ machine, details }).filter((id) => measured.has(id)),
    components,
    ...(shims === undefined ? {} : { shims }),
    ...(wanted ? { objective: wanted } : {}),
    ...(maximumIncrement === undefined ? {} : { maximumIncrement }),
    ...(maximumMisfit === undefined ? {} : { maximumMisfit }),
    ...(indicators ? { indicators } : {}),
    ...(couplings ? { couplings: couplings.filter(({ station }) => measured.has(station)) } : {}),
    note,
  };
}

/** Two surveys of a job, what was planned between them, and what its log says was moved and measured. */
export function confirmationRequestOf(
  { machine, details }: JobBasis,
  state: JobState,
  surveys: {
    readonly before: SurveyState;
    readonly after: SurveyState;
    readonly fitsOf: (survey: SurveyState) => readonly BoreFitResult[];
  },
  planned: ShimMoveResult | null,
  note: string | null,
): ConfirmationRequest {
  const { before, after, fitsOf } = surveys;
  const stationsOf = (survey: SurveyState) =>
    axisRequestOf({ machine, details }, fitsOf(survey), "").stations.map(
      ({ weight: _none, ...station }) => station,
    );
  const from = state.surveys.indexOf(before);
  const to = state.surveys.indexOf(after);
  const touched = new Set(state.moves.map(({ document }) => document.component));
  return {
    units: lengthUnits(machine.units),
    ...levelOf(details),
    before: { stations: stationsOf(before) },
    after: { stations: stationsOf(after) },
    sameSetUp: state.surveys.slice(from + 1, to + 1).every(({ entry }) => entry.document.sameSetUp),
    reference: [...axisStations({ machine, details })],
    ...(details.verdict ? { verdict: details.verdict } : {}),
    components: (machine.components ?? []).map(({ id, stations, carriedBy, supports }) => ({
      id,
      stations: stations ?? [],
      ...(carriedBy === undefined ? {} : { carriedBy }),
      supports: (supports ?? []).map((support) => ({ id: support.id, z: support.z })),
    })),
    moves: (planned?.components ?? [])
      .filter(({ id }) => touched.has(id))
      .flatMap((one) => plannedBoreMoves(one).map((move) => ({ component: one.id, ...move }))),
    log: [
      ...state.moves.map(({ document }) => ({
        at: document.at,
        event: "moved" as const,
        component: document.component,
      })),
      ...state.surveys.flatMap((survey) =>
        countingReadings(survey).opening.map(({ document: { reading } }) => ({
          at: reading.takenAt,
          event: "measured" as const,
          station: reading.station,
        })),
      ),
    ],
    note,
  };
}

/** The survey's name: what people called it, or its stage. */
export function surveyTitle({ document }: JobEntry<"survey">): string {
  const stage = { as_found: "as found", after_step: "after a step", as_left: "as left" }[document.stage];
  return document.label ? `${document.label} (${stage})` : stage;
}

function axisOf({ machine, details }: JobBasis): AxisDeviationRequest["axis"] {
  return details.axis ?? { method: "least_squares", through: [...(machine.reference ?? [])] };
}

const levelOf = ({ level }: JobDetails) => (level === undefined ? {} : { level });
const lengthUnits = ({ axial, bore, offset }: Units): Units => ({ axial, bore, offset });
