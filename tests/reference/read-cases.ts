import { existsSync, readdirSync, readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { describe, expect, it } from "vitest";
import { notExpressed } from "./case-list.ts";

/** One published or closed-form case; `source` says where it comes from and what of it is from memory. */
export interface ReferenceCase<Input = unknown, Expected = Record<string, unknown>> {
  readonly id: string;
  readonly kind: string;
  readonly source: { readonly citation: string };
  readonly statement: string;
  readonly input: Input;
  readonly expected: Expected;
  /** Dotted field of `expected` → how near. Free text is not machine checked. */
  readonly tolerance: Readonly<Record<string, Tolerance | string>>;
  /** The answer in full precision, where `expected` is only as long as it was printed. */
  readonly recomputed?: Expected;
}

interface Tolerance {
  readonly abs?: number;
  readonly rel?: number;
  /** Relative to the largest entry of the field. */
  readonly rel_to_max?: number;
}

export interface Mismatch {
  readonly field: string;
  readonly expected: unknown;
  readonly got: unknown;
}

const referenceDir = resolve(process.env["REFERENCE_DIR"] ?? "../shared/reference");
const referenceFound = existsSync(join(referenceDir, "open"));

/** Every case, in order of file name. */
export function readAllCases(): ReferenceCase[] {
  if (!referenceFound) return [];
  const folder = join(referenceDir, "open");
  return readdirSync(folder)
    .filter((name) => name.endsWith(".json"))
    .sort()
    .map((name) => JSON.parse(readFileSync(join(folder, name), "utf8")) as ReferenceCase);
}

/** The cases of the named kinds that the service can express, in order of file name. */
export function readCases<Input, Expected>(...kinds: string[]): ReferenceCase<Input, Expected>[] {
  return readAllCases().filter(
    ({ id, kind }) => kinds.includes(kind) && !(id in notExpressed),
  ) as ReferenceCase<Input, Expected>[];
}

/**
 * Tests that need the reference folder. Without it: one skipped test that says so, or, where CI is set, one that fails,
 * since a run without its references proves nothing.
 */
export function describeReferences(title: string, what: string, body: () => void): void {
  describe(title, () => {
    if (referenceFound) return body();
    const missing = `the reference folder ${referenceDir} is absent: no case of ${what} is checked`;
    if (process.env["CI"]) it(missing, () => expect.fail(missing));
    else it.skip(missing);
  });
}

/** One test per case of the named kinds that the service can express. */
export function describeCases<Input, Expected>(
  title: string,
  kinds: string[],
  check: (reference: ReferenceCase<Input, Expected>) => void | Promise<void>,
  /** Only where a test is about some cases; what the service cannot express at all stands in case-list.ts. */
  some: (reference: ReferenceCase<Input, Expected>) => boolean = () => true,
): void {
  describeReferences(title, kinds.join(", "), () => {
    const cases = readCases<Input, Expected>(...kinds);
    it(`finds cases of ${kinds.join(", ")}`, () => {
      expect(kinds.filter((kind) => !cases.some((one) => one.kind === kind))).toEqual([]);
    });
    const chosen = cases.filter(some);
    it("has one of them at least", () => {
      expect(chosen.length).toBeGreaterThan(0);
    });
    for (const one of chosen) it(one.id, () => check(one));
  });
}

/** What of `got` is not within the case's tolerances of what it expects; empty when all is. */
export function mismatches(
  { expected, tolerance }: Pick<ReferenceCase<unknown, unknown>, "expected" | "tolerance">,
  got: unknown,
): Mismatch[] {
  return Object.entries(tolerance).flatMap(([field, limit]): Mismatch[] => {
    if (typeof limit === "string" && limit !== "exact" && limit !== "exact set") return [];
    const wanted = at(expected, field);
    const reached = at(got, field);
    const agrees = typeof limit === "string" ? same(wanted, reached, limit) : near(wanted, reached, limit);
    return wanted !== undefined && reached !== undefined && agrees
      ? []
      : [{ field, expected: wanted, got: reached }];
  });
}

function at(value: unknown, path: string): unknown {
  return path.split(".").reduce<unknown>((inner, step) => (isRecord(inner) ? inner[step] : undefined), value);
}

function same(wanted: unknown, reached: unknown, how: "exact" | "exact set"): boolean {
  const form = (value: unknown) =>
    how === "exact set" && Array.isArray(value)
      ? JSON.stringify(value.map((one) => JSON.stringify(one)).sort())
      : JSON.stringify(value);
  return form(wanted) === form(reached);
}

function near(wanted: unknown, reached: unknown, { abs = 0, rel = 0, rel_to_max = 0 }: Tolerance): boolean {
  const largest = Math.max(0, ...numbersIn(wanted).map(Math.abs));
  const agrees = (one: unknown, other: unknown): boolean => {
    if (one === null) return true;
    if (Array.isArray(one)) {
      return (
        Array.isArray(other) &&
        one.length === other.length &&
        one.every((inner, index) => agrees(inner, other[index]))
      );
    }
    if (isRecord(one))
      return isRecord(other) && Object.entries(one).every(([key, inner]) => agrees(inner, other[key]));
    if (typeof one !== "number") return one === other;
    const limit = abs + rel * Math.abs(one) + rel_to_max * largest;
    return typeof other === "number" && Math.abs(one - other) <= limit * (1 + 1e-9);
  };
  return agrees(wanted, reached);
}

function numbersIn(value: unknown): number[] {
  if (typeof value === "number") return [value];
  return isRecord(value) ? Object.values(value).flatMap(numbersIn) : [];
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null;
}
