import { Matrix, SingularValueDecomposition, solve } from "ml-matrix";
import type { Centre } from "./central-path.ts";
import { columnsOf, meetContacts, type Contacts } from "./contact-equations.ts";
import { remaindersOf, squaresOf, unknownsOf, type MinimaxProblem } from "./minimax-problem.ts";

/** How the contacts are first told apart from points that only come near. */
export interface Caution {
  /**
   * The least strength of a contact, of the largest. The end of the central path leaves about its gap at points without
   * contact, and its root at points that touch without holding anything.
   */
  readonly strengthMin: number;
  /** A column within this share of its length of the span of others depends on them. */
  readonly dependentWithin: number;
}

/** The same for a point that enters once x is settled. */
const dependentWithin = 1e-9;
/** A factor of a dependence, of 1 or so, that is rounding. */
const negligibleFactor = 1e-9;
/** How far, as a share of the squared radius, a point may stand out: rounding. */
const standsOutBy = 1e-12;
/** A strength this far below 0, of the largest, is not rounding. */
const negativeFrom = -1e-9;
/** A contact of this strength or less, of the largest, holds nothing. */
const holdsFrom = 1e-7;
const exchangesMost = 200;

/**
 * From the end of the central path to the optimum itself: chooses contacts whose conditions are independent, at most
 * one more than unknowns (Carathéodory), and solves the equations of Karush, Kuhn and Tucker on them by Newton's
 * method; a point that then stands out enters and one whose strength reaches 0 leaves, as in the simplex method.
 * When the contacts do not determine x, because their design columns do not, one of them is answered alone; null when
 * the contacts do not come to rest.
 */
export function settleContacts(
  problem: MinimaxProblem,
  centre: Centre,
  caution: Caution,
): Contacts | { readonly openAt: number } | null {
  let contacts: Contacts | null = firstContacts(problem, centre, caution);
  for (let exchange = 0; exchange < exchangesMost && contacts; exchange += 1) {
    const held: Contacts = contacts;
    contacts = meetContacts(problem, held);
    const openAt = openPlace(problem, contacts ?? held);
    if (openAt !== null) return { openAt };
    if (contacts === null) {
      contacts = held.places.length > 2 ? loosen(problem, held) : null;
      continue;
    }
    const { places, strengths } = contacts;
    const weakest = Math.min(...strengths);
    if (weakest < negativeFrom * Math.max(...strengths)) {
      contacts = without(contacts, strengths.indexOf(weakest));
      continue;
    }
    const squares = squaresOf(problem, remaindersOf(problem, contacts.x));
    const radius2 = Math.max(...places.map((j) => squares[j]!));
    const farthest = squares.reduce((most, square, j) => (square > squares[most]! ? j : most), 0);
    if (squares[farthest]! <= radius2 * (1 + standsOutBy)) return contacts;
    contacts = enter(problem, contacts, farthest, 0, dependentWithin);
  }
  return null;
}

function firstContacts(
  problem: MinimaxProblem,
  { x, shares }: Centre,
  { strengthMin, dependentWithin }: Caution,
): Contacts {
  const least = Math.min(...problem.weights);
  const strengths = shares.map((share, j) => (share * problem.weights[j]!) / least);
  const most = Math.max(...strengths);
  const candidates = [...strengths.keys()]
    .filter((j) => strengths[j]! >= strengthMin * most)
    .sort((a, b) => strengths[b]! - strengths[a]!);
  let contacts: Contacts = { x, places: [], strengths: [] };
  for (const j of candidates) contacts = enter(problem, contacts, j, strengths[j]!, dependentWithin);
  return contacts;
}

/**
 * Takes a point among the contacts with its strength. Where its condition depends on theirs, strengths are moved along
 * the dependence, which changes no sum, until one is 0 and its point leaves: as the strength of the entering point is
 * used up, or, of one that stands out with strength 0, as it grows.
 */
function enter(
  problem: MinimaxProblem,
  contacts: Contacts,
  entering: number,
  strength: number,
  within: number,
): Contacts {
  const { x, places, strengths } = contacts;
  const joined = { x, places: [...places, entering], strengths: [...strengths, strength] };
  const dependence = dependenceOn(problem, contacts, entering, within);
  if (dependence === null) return joined;
  // Column of the entering point = Σ dependence·columns. Giving its strength θ back adds θ·dependence to the others.
  const sign = strength > 0 ? 1 : -1;
  let [most, leaving] = [strength > 0 ? strength : Infinity, places.length];
  for (const [c, factor] of dependence.entries()) {
    const falls = -sign * factor;
    if (falls > negligibleFactor && strengths[c]! / falls < most) {
      [most, leaving] = [Math.max(0, strengths[c]!) / falls, c];
    }
  }
  if (!Number.isFinite(most)) return contacts;
  const moved = strengths.map((old, c) => old + sign * most * dependence[c]!);
  return without({ ...joined, strengths: [...moved, strength - sign * most] }, leaving);
}

/** Factors that make the conditions' columns of `contacts` the column of `entering`; null when they cannot. */
function dependenceOn(
  problem: MinimaxProblem,
  { x, places }: Contacts,
  entering: number,
  within: number,
): number[] | null {
  if (places.length === 0) return null;
  const columns = columnsOf(problem, x, places);
  const target = columnsOf(problem, x, [entering]);
  const factors = solve(columns, target, true);
  const left = Matrix.sub(target, columns.mmul(factors)).norm();
  return left > within * target.norm() && places.length <= unknownsOf(problem) ? null : factors.getColumn(0);
}

/** Contacts that nearly depend on each other, less the one whose strength is used up first along that dependence. */
function loosen(problem: MinimaxProblem, contacts: Contacts): Contacts {
  const { x, places, strengths } = contacts;
  const columns = columnsOf(problem, x, places);
  const turned = new SingularValueDecomposition(columns, { autoTranspose: true }).rightSingularVectors;
  const weakest = turned.getColumn(places.length - 1);
  const ways = [1, -1].flatMap((sign) =>
    weakest.map((part, c) => ({
      c,
      sign,
      reach: sign * part > negligibleFactor ? strengths[c]! / (sign * part) : Infinity,
    })),
  );
  const first = ways.reduce((least, way) => (way.reach < least.reach ? way : least));
  const moved = strengths.map((strength, c) => strength - first.sign * first.reach * weakest[c]!);
  return without({ x, places, strengths: moved }, first.c);
}

function without({ x, places, strengths }: Contacts, leaving: number): Contacts {
  return {
    x,
    places: places.filter((_, c) => c !== leaving),
    strengths: strengths.filter((_, c) => c !== leaving),
  };
}

/** A contact that all others that hold anything share their second design column with; null when they do not. */
function openPlace({ design }: MinimaxProblem, { places, strengths }: Contacts): number | null {
  const [, second] = design;
  if (!second) return null;
  const most = Math.max(...strengths);
  const holding = places.filter((_, c) => Math.abs(strengths[c]!) > holdsFrom * most);
  const values = holding.map((j) => second[j]!);
  return Math.max(...values) - Math.min(...values) > 1e-12 ? null : (holding[0] ?? null);
}
