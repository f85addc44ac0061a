import { problemKinds, type Fault, type ProblemCode } from "../../shared/error-codes.ts";
import { limits } from "../../shared/limits.ts";
import type { Problem } from "../../shared/schemas/problem.ts";

/** A fault outside the body: of a query parameter or a header. */
export interface AddressFault {
  readonly parameter?: string;
  readonly header?: string;
  readonly code: ProblemCode;
  readonly detail: string;
}

export interface ProblemMembers {
  readonly errors?: readonly (Fault | AddressFault)[];
  readonly id?: string;
  readonly scope?: string;
  readonly obstacles?: { code: string; detail: string; station: string | null }[];
  readonly limit?: number;
  readonly retryAfterSeconds?: number;
}

/** An answer that is not a success: thrown anywhere, written by the error exit alone. */
export class HttpProblem extends Error {
  readonly status: number;
  constructor(
    readonly code: ProblemCode,
    readonly detail: string,
    readonly members: ProblemMembers = {},
    readonly headers: Readonly<Record<string, string>> = {},
  ) {
    super(`${code}: ${detail}`);
    this.name = "HttpProblem";
    this.status = problemKinds[code].status;
  }
}

/** The RFC 9457 body. Faults past the listing limit are counted, not listed. */
export function problemBody(problem: HttpProblem, requestId: string, instance: string): Problem {
  const { title, fix } = problemKinds[problem.code];
  const { errors, ...members } = problem.members;
  const more = errors ? errors.length - limits.faultsListed : 0;
  return {
    type: `/v1/problems/${problem.code}`,
    title,
    status: problem.status,
    detail: problem.detail,
    code: problem.code,
    requestId,
    instance,
    fix,
    ...members,
    ...(errors ? { errors: errors.slice(0, limits.faultsListed) } : {}),
    ...(more > 0 ? { more } : {}),
  };
}

/** One problem for all faults of a body: it carries their code when they share one. */
export function problemOfFaults(faults: readonly Fault[], members: ProblemMembers = {}): HttpProblem {
  const [first] = faults;
  if (!first) throw new Error("A refusal names at least one fault.");
  const code = faults.every((fault) => fault.code === first.code) ? first.code : "several_faults";
  const place = first.pointer === "" ? "the body" : first.pointer;
  const detail =
    faults.length === 1
      ? `At ${place}: ${first.detail}`
      : `${faults.length} faults; the first at ${place}: ${first.detail}`;
  return new HttpProblem(code, detail, { ...members, errors: faults });
}
