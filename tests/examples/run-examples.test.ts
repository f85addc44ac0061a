import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { findFreePort } from "../../server/bootstrap/ports.mjs";
import { operations } from "../../server/routes/index.ts";
import { operationAccess, type Access } from "../../shared/access.ts";
import type { alignmentResponse } from "../../shared/schemas/alignments.ts";
import type { axisDeviationResponse } from "../../shared/schemas/axis-deviations.ts";
import type { boreFitResponse } from "../../shared/schemas/bore-fits.ts";
import type { coldTargetResponse } from "../../shared/schemas/cold-targets.ts";
import type { confirmationResponse } from "../../shared/schemas/confirmations.ts";
import type { fewestMovesResponse } from "../../shared/schemas/fewest-moves.ts";
import type { measurementPlanResponse } from "../../shared/schemas/measurement-plans.ts";
import type { repeatabilityStudyResponse } from "../../shared/schemas/repeatability-studies.ts";
import type { shimMoveResponse } from "../../shared/schemas/shim-moves.ts";
import type { sightLineSetupResponse } from "../../shared/schemas/sight-line-setups.ts";
import type { z } from "zod";
import { makeOrganisation } from "../support/factories.ts";
import { openListeningApp, type ListeningApp } from "../support/listening-app.ts";
import { runProgram, type Ended } from "../support/run-program.ts";

const requests = fileURLToPath(new URL("../../examples/requests/", import.meta.url));

/** How a script of each language is started. */
const languages: Readonly<Record<string, (resource: string) => string[]>> = {
  curl: (resource) => ["sh", `examples/curl/${resource}.sh`],
  typescript: (resource) => [process.execPath, "--import", "tsx", `examples/typescript/${resource}.ts`],
  python: (resource) => ["python3", "-B", `examples/python/${resource}.py`],
};

const fixed = (value: number, unit: string, digits = 4) => `${value.toFixed(digits)} ${unit}`;

function boreFitLines({ units, result }: z.infer<typeof boreFitResponse>): string[] {
  return result.bores.flatMap(({ id, centre, diameter, warnings }) => [
    `${id}: centre h ${fixed(centre.h, units.offset)}, v ${fixed(centre.v, units.offset)}; diameter ${diameter === null ? "not known" : fixed(diameter, units.bore, 3)}`,
    ...warnings.map(({ code, detail }) => `  ${code}: ${detail}`),
  ]);
}

function axisDeviationLines({ units, result }: z.infer<typeof axisDeviationResponse>): string[] {
  return result.stations.map(({ id, deviation: { h, v, radial }, verdict }) => {
    const [right, up, size] = [h, v, radial].map((value) => fixed(value, units.offset));
    return `${id}: deviation h ${right}, v ${up}, radial ${size}; ${verdict ?? "no tolerance"}`;
  });
}

function shimMoveLines({ units, cautions, result }: z.infer<typeof shimMoveResponse>): string[] {
  const length = (value: number) => fixed(value, units.offset);
  return [
    ...cautions.map(({ text }) => `Caution: ${text}`),
    ...result.components.flatMap(({ id, realised, stacks }) => [
      ...realised.map(({ support, h, v }) => `${id} at ${support}: move h ${length(h)}, v ${length(v)}`),
      ...stacks.map(
        ({ support, place, from, to, change }) =>
          `  ${support} ${place}: from ${length(from)} to ${length(to)}, change ${length(change)}`,
      ),
    ]),
  ];
}

function fewestMovesLines({ units, cautions, result }: z.infer<typeof fewestMovesResponse>): string[] {
  const length = (value: number) => fixed(value, units.offset);
  const { infeasible, cost, axis, components, advice } = result;
  return [
    ...cautions.map(({ text }) => `Caution: ${text}`),
    infeasible ? `No choice: ${infeasible.reason}` : `Cost ${cost}`,
    ...axis.float.map(({ id, h, v }) => `axis at ${id}: h ${length(h)}, v ${length(v)}`),
    ...components.flatMap(({ id, moved, moves }) =>
      moved
        ? moves.map(({ support, h, v }) => `${id} at ${support}: move h ${length(h)}, v ${length(v)}`)
        : [],
    ),
    ...advice.map(({ code, detail }) => `  ${code}: ${detail}`),
  ];
}

function alignmentLines({ units, cautions, result }: z.infer<typeof alignmentResponse>): string[] {
  const length = (value: number) => fixed(value, units.offset);
  return [
    ...cautions.map(({ text }) => `Caution: ${text}`),
    ...result.stations.map(
      ({ id, deviation: { h, v }, verdict }) =>
        `${id}: deviation h ${length(h)}, v ${length(v)}; ${verdict ?? "no tolerance"}`,
    ),
    ...(result.moves?.components ?? []).flatMap(({ id, realised }) =>
      realised.map(({ support, h, v }) => `${id} at ${support}: move h ${length(h)}, v ${length(v)}`),
    ),
  ];
}

function coldTargetLines({ units, result }: z.infer<typeof coldTargetResponse>): string[] {
  return [
    ...result.stations.flatMap(({ id, target: { h, v }, warnings }) => [
      `${id}: target h ${fixed(h, units.offset)}, v ${fixed(v, units.offset)}`,
      ...warnings.map(({ code, detail }) => `  ${code}: ${detail}`),
    ]),
    ...(result.rotor?.warnings ?? []).map(({ code, detail }) => `${code}: ${detail}`),
  ];
}

function confirmationLines({ units, cautions, result }: z.infer<typeof confirmationResponse>): string[] {
  const vector = ({ h, v }: { h: number; v: number }) =>
    `h ${fixed(h, units.offset)}, v ${fixed(v, units.offset)}`;
  const { repeats } = result.reference;
  return [
    ...cautions.map(({ text }) => `Caution: ${text}`),
    `Reference stations ${repeats === null ? "are not shown to repeat" : repeats ? "repeat" : "do not repeat"}`,
    ...result.moved.map(
      ({ id, planned, achieved }) =>
        `${id}: planned ${planned ? vector(planned) : "nothing"}; achieved ${achieved ? vector(achieved) : "not known"}`,
    ),
    `Unexpected: ${result.unexpected.join(", ") || "none"}`,
    `Outstanding: ${result.outstanding.join(", ") || "none"}`,
    ...result.warnings.map(({ code, detail }) => `  ${code}: ${detail}`),
  ];
}

function repeatabilityStudyLines({ units, result }: z.infer<typeof repeatabilityStudyResponse>): string[] {
  const vector = ({ h, v }: { h: number; v: number }) =>
    `h ${fixed(h, units.offset)}, v ${fixed(v, units.offset)}`;
  const found =
    result.form === "one_station"
      ? [
          `${result.station}: mean ${vector(result.mean)}`,
          `standard deviation ${vector(result.standardDeviation)}`,
          `uncertainty of the mean ${vector(result.uncertainty)}`,
        ]
      : Object.entries(result.components).map(
          ([source, component]) => `${source}: standard deviation ${vector(component)}`,
        );
  return [...found, ...result.warnings.map(({ code, detail }) => `  ${code}: ${detail}`)];
}

function measurementPlanLines({ units, result }: z.infer<typeof measurementPlanResponse>): string[] {
  return result.bores.flatMap(({ id, status, add, addCount, after, warnings }) => [
    `${id}: ${status}; add ${addCount}, then U ${after ? fixed(after.expandedUncertainty.radial, units.offset) : "not known"}`,
    ...add.map(({ clockDeg, readings }) => `  at ${fixed(clockDeg, "deg", 1)}: ${readings}`),
    ...warnings.map(({ code, detail }) => `  ${code}: ${detail}`),
  ]);
}

function sightLineSetupLines({ units, cautions, result }: z.infer<typeof sightLineSetupResponse>): string[] {
  const vector = ({ h, v }: { h: number; v: number }) =>
    `h ${fixed(h, units.offset)}, v ${fixed(v, units.offset)}`;
  const { stations, adjustment, next, warnings } = result;
  return [
    ...cautions.map(({ text }) => `Caution: ${text}`),
    ...stations.map(
      ({ id, off, within }) => `${id}: beam off ${vector(off)}; ${within ? "within" : "not within"}`,
    ),
    ...(adjustment === null
      ? []
      : [
          `Source: shift ${vector(adjustment.shift)}`,
          `Source: tilt h ${fixed(adjustment.tiltMilliradians.h, "mrad")}, v ${fixed(adjustment.tiltMilliradians.v, "mrad")}`,
          ...(adjustment.moves ?? []).map((move) => `  ${move.at}: move ${vector(move)}`),
        ]),
    `Next: ${next}`,
    ...warnings.map(({ code, detail }) => `  ${code}: ${detail}`),
  ];
}

/** What a script must print of a stored answer, beside the record's id. */
const linesOf: Readonly<Record<string, (answer: never) => string[]>> = {
  "bore-fits": boreFitLines,
  "axis-deviations": axisDeviationLines,
  "shim-moves": shimMoveLines,
  "fewest-moves": fewestMovesLines,
  alignments: alignmentLines,
  "cold-targets": coldTargetLines,
  confirmations: confirmationLines,
  "repeatability-studies": repeatabilityStudyLines,
  "measurement-plans": measurementPlanLines,
  "sight-line-setups": sightLineSetupLines,
};

const resources = Object.keys(linesOf);
const filesOf = (resource: string) => readdirSync(join(requests, resource)).sort();
const requestIn = (file: string) => JSON.parse(readFileSync(file, "utf8")) as unknown;
const everyScript = Object.keys(languages).flatMap((language) =>
  resources.map((resource) => [language, resource] as const),
);

let app: ListeningApp;
let secret: string;
beforeAll(async () => {
  app = await openListeningApp();
  ({ secret } = await (await makeOrganisation(app.deps)).key("calculations:write", "calculations:read"));
});
afterAll(() => app.close());

function run(language: string, resource: string, ...args: string[]): Promise<Ended> {
  return runWith({ BOREWRIGHT_KEY: secret }, language, resource, ...args);
}

function runWith(environment: Record<string, string>, language: string, resource: string, ...args: string[]) {
  const command = languages[language]?.(resource) ?? [];
  return runProgram([...command, ...args], { BOREWRIGHT_URL: app.url, ...environment });
}

async function recordOf({ stdout }: Ended) {
  const id = /^Record (\S+)$/m.exec(stdout)?.[1] ?? "";
  const response = await app.call().get(`/v1/calculations/${id}`).set("Authorization", `Bearer ${secret}`);
  expect(response.status).toBe(200);
  return response.body as { status: string; request: unknown; response: never };
}

describe.each(everyScript)("the example in %s for %s", (language, resource) => {
  it("prints what the service has stored, from its own request and from another", async () => {
    const files = filesOf(resource).map((name) => join(requests, resource, name));
    const another = files.at(-1) ?? "";
    const sent: unknown[] = [];
    for (const args of [[], [another]]) {
      const ended = await run(language, resource, ...args);
      expect(ended).toMatchObject({ code: 0, stderr: "" });
      const { status, request, response } = await recordOf(ended);
      expect(status).toBe("succeeded");
      expect(ended.stdout.trimEnd().split("\n").slice(1)).toEqual(linesOf[resource]?.(response));
      sent.push(request);
    }
    const [own, other] = sent;
    expect(files.map(requestIn)).toContainEqual(own);
    expect(other).toEqual(requestIn(another));
  });
});

describe.each(Object.keys(languages))("an example in %s", (language) => {
  const folder = mkdtempSync(join(tmpdir(), "borewright-examples-"));
  afterAll(() => rmSync(folder, { recursive: true }));

  it("tells every place at fault of a request that is refused, and fails", async () => {
    const file = join(folder, "faulty.json");
    const bore = { id: "brg-1", form: "points", points: [{ h: "left", v: 1 }] };
    writeFileSync(file, JSON.stringify({ seen: "downstream", bores: [bore] }));
    const { code, stdout, stderr } = await run(language, "bore-fits", file);
    expect(code).toBe(1);
    expect(stdout).toBe("");
    const [head, ...places] = stderr.trimEnd().split("\n");
    expect(head).toMatch(/^422 several_faults: /);
    expect(places.map((line) => /^ {2}(\S+ \w+): ./.exec(line)?.[1]).sort()).toEqual([
      "/bores/0/points/0/h wrong_type",
      "/units units_missing",
    ]);
  });

  it("tells that a key is not valid, and fails", async () => {
    const ended = await runWith({ BOREWRIGHT_KEY: `${secret}x` }, language, "axis-deviations");
    expect(ended).toMatchObject({ code: 1, stdout: "" });
    expect(ended.stderr).toMatch(/^401 credential_invalid: /);
  });

  it("asks for a key where none is set", async () => {
    const { code, stderr } = await runWith({}, language, "axis-deviations");
    expect(code).not.toBe(0);
    expect(stderr).toContain("BOREWRIGHT_KEY");
    expect(stderr).toContain("calculations:write");
  });

  it("says so where nothing answers, and fails", async () => {
    const nowhere = `http://127.0.0.1:${await findFreePort()}`;
    const settings = { BOREWRIGHT_KEY: secret, BOREWRIGHT_URL: nowhere };
    const { code, stdout, stderr } = await runWith(settings, language, "axis-deviations");
    expect(code).not.toBe(0);
    expect(stdout).toBe("");
    expect(stderr).toContain(new URL(nowhere).port);
    expect(stderr).not.toContain(secret);
  });
});

describe("the request files", () => {
  it("are there for every computing operation, and for nothing else", () => {
    const computing = operations.filter(({ operationId, path }) => {
      const access: Access = operationAccess[operationId];
      return access.by === "scope" && access.scope === "calculations:write" && !path.includes("{");
    });
    const wanted = computing.map(({ path }) => path.replace("/v1/", "")).sort();
    expect(readdirSync(requests).sort()).toEqual(wanted);
    expect([...resources].sort()).toEqual(wanted);
  });

  it("say in a note what they show, each in words of its own", () => {
    const notes = resources.flatMap((resource) =>
      filesOf(resource).map((name) => {
        const { note } = JSON.parse(readFileSync(join(requests, resource, name), "utf8")) as {
          note?: string;
        };
        return note ?? name;
      }),
    );
    expect(notes.filter((note) => note.length < 20)).toEqual([]);
    expect(new Set(notes).size).toBe(notes.length);
  });
});
