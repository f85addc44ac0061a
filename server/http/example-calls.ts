import { readdirSync, readFileSync } from "node:fs";
import canonicalize from "canonicalize";
import type { CalculationKind } from "../calculations/calculation-kind.ts";
import { engineVersion } from "../compute/version.ts";
import { sha256 } from "../services/run-calculation.ts";
import type { ExampleSet } from "./operation.ts";

const folder = new URL("../../examples/", import.meta.url);
/** The moment and id of every example answer: an example must not change from day to day. */
const EXAMPLE_ID = "0193a5e0-7c00-7000-8000-000000000001";
const EXAMPLE_TIME = "2026-12-01T06:00:00.000Z";

/** The example requests of one resource: `examples/requests/<resource>/*.json`, each a body that works as it stands. */
export function exampleRequests(resource: string): ExampleSet {
  return examplesIn(`requests/${resource}`);
}

/** The bodies in a folder of `examples/`, by file name. */
export function examplesIn(path: string): ExampleSet {
  const files = readdirSync(new URL(`${path}/`, folder)).filter((name) => name.endsWith(".json"));
  return Object.fromEntries(
    files.sort().map((file) => {
      const name = file.replace(/\.json$/, "");
      const value: unknown = JSON.parse(readFileSync(new URL(`${path}/${file}`, folder), "utf8"));
      return [name, { summary: summaryOf(name, value), value }];
    }),
  );
}

/** What the engine answers to those requests, computed and not written by hand. */
export function exampleAnswers<Request>(
  resource: string,
  kind: CalculationKind<Request, object>,
): ExampleSet {
  return Object.fromEntries(
    Object.entries(exampleRequests(resource)).map(([name, { summary, value }]) => {
      const envelope = {
        id: EXAMPLE_ID,
        kind: kind.kind,
        engineVersion,
        inputHash: sha256(canonicalize(value) ?? ""),
        createdAt: EXAMPLE_TIME,
      };
      return [name, { summary, value: { ...envelope, ...kind.answer(kind.request.parse(value)) } }];
    }),
  );
}

/** The note of an example says what it shows. */
function summaryOf(name: string, value: unknown): string {
  const { note } = value as { note?: unknown };
  return typeof note === "string" ? note : name.replaceAll("-", " ");
}
