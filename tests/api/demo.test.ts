import { mkdtempSync, readFileSync, rmSync, statSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { z } from "zod";
import type { CalculationKind } from "../../server/calculations/calculation-kind.ts";
import { seedDemo } from "../../server/demo/seed-demo.ts";
import { ComputePool } from "../../server/services/compute-pool.ts";
import { axisDeviationRequest, axisDeviationResponse } from "../../shared/schemas/axis-deviations.ts";
import { boreFitResponse } from "../../shared/schemas/bore-fits.ts";
import type { calculationPage, calculationRecord } from "../../shared/schemas/calculations.ts";
import type { jobPage, jobRecord } from "../../shared/schemas/jobs.ts";
import { shimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import { openListeningApp, type ListeningApp } from "../support/listening-app.ts";
import { runProgram } from "../support/run-program.ts";

type Page = z.infer<typeof calculationPage>;
type StoredRecord = z.infer<typeof calculationRecord>;

describe("the demo", () => {
  const folder = mkdtempSync(join(tmpdir(), "borewright-demo-"));
  const file = join(folder, "demo-sign-ins.txt");
  let app: ListeningApp;
  let first: string[];
  beforeAll(async () => {
    app = await openListeningApp({ DATA_DIR: folder });
    first = await seed();
  });
  afterAll(async () => {
    await app.close();
    rmSync(folder, { recursive: true });
  });

  async function seed(): Promise<string[]> {
    const lines: string[] = [];
    await seedDemo(app.deps, app.url, (line) => lines.push(line));
    return lines;
  }

  async function counts() {
    const { organisations, members, apiKeys, calculations } = app.deps.database.models;
    return Promise.all([organisations.count(), members.count(), apiKeys.count(), calculations.count()]);
  }

  /** As a person does it: with an e-mail and a password as they were printed. */
  async function signIn(role: string): Promise<string> {
    const [, email, password] = new RegExp(`^  ${role} +(\\S+)  (\\S+)$`, "m").exec(first.join("\n")) ?? [];
    const answer = await app.call().post("/v1/sessions").send({ email, password });
    expect(answer.status).toBe(201);
    expect(answer.body.member.role).toBe(role);
    return answer.body.accessToken as string;
  }

  async function read<Body>(path: string): Promise<Body> {
    const answer = await app
      .call()
      .get(path)
      .set("Authorization", `Bearer ${await signIn("viewer")}`);
    expect(answer.status).toBe(200);
    return answer.body as Body;
  }

  /** The records of the outage in the order made, whole; those of the job are told by the job. */
  async function records(): Promise<StoredRecord[]> {
    const { data } = await read<Page>("/v1/calculations");
    const alone = data.filter(({ jobId }) => jobId === null);
    return Promise.all([...alone].reverse().map(({ id }) => read<StoredRecord>(`/v1/calculations/${id}`)));
  }

  it("prints sign-ins that work, one for each role, and keeps them for the owner alone", async () => {
    for (const role of ["admin", "engineer", "developer", "viewer"]) await signIn(role);
    expect(readFileSync(file, "utf8")).toBe(`${first.join("\n")}\n`);
    expect(statSync(file).mode & 0o777).toBe(0o600);
  });

  it("has a machine with a signed job, nothing in which wants a person", async () => {
    const { data } = await read<z.infer<typeof jobPage>>("/v1/jobs");
    expect(data.map(({ state, machineName }) => [state, machineName])).toEqual([
      ["signed", "Fellgate Unit 2"],
    ]);
    const job = await read<z.infer<typeof jobRecord>>(`/v1/jobs/${data[0]?.id}`);
    expect([job.flags, job.signature?.name]).toEqual([[], "Ines Alder"]);
  });

  it("tells an outage: a survey refused, as found, deviations, moves, as left, deviations", async () => {
    const told = (await records()).map(({ kind, status }) => `${kind} ${status}`);
    expect(told).toEqual([
      "bore-fit failed",
      "bore-fit succeeded",
      "axis-deviation succeeded",
      "shim-move succeeded",
      "bore-fit succeeded",
      "axis-deviation succeeded",
    ]);
  });

  it("has a machine of 12 stations and more, each with a target, a tolerance and a place on a component", async () => {
    const [, , deviations, moves] = (await records()).map(({ request }) => request);
    const { stations } = axisDeviationRequest.parse(deviations);
    expect(stations.length).toBeGreaterThanOrEqual(12);
    expect(stations.filter(({ target, tolerance }) => !target || !tolerance)).toEqual([]);
    expect(new Set(stations.map(({ target }) => target?.v)).size).toBeGreaterThan(10);
    const { components } = shimMoveRequest.parse(moves);
    expect(components.flatMap((component) => component.stations ?? []).sort()).toEqual(
      stations.map(({ id }) => id).sort(),
    );
    expect(components.filter(({ supports = [] }) => supports.length === 0)).toEqual([]);
  });

  it("has readings that scatter as much as is stated of them, and the slip that was put in", async () => {
    const surveys = (await records()).filter(({ kind, response }) => kind === "bore-fit" && response);
    expect(surveys).toHaveLength(2);
    for (const { response } of surveys) {
      const { bores } = boreFitResponse.parse(response).result;
      const sum = (values: number[]) => values.reduce((total, value) => total + value, 0);
      const chiSquare = sum(bores.map(({ statistics }) => statistics.chiSquare ?? NaN));
      const dof = sum(bores.map(({ statistics }) => statistics.readingsUsed - statistics.parameters));
      // 1 but for the bores' own shape; its standard deviation at 300 degrees of freedom is 0.08.
      expect(chiSquare / dof).toBeGreaterThan(0.75);
      expect(chiSquare / dof).toBeLessThan(1.5);
    }
    const excluded = surveys.map(({ response }) =>
      boreFitResponse
        .parse(response)
        .result.bores.flatMap(({ id, exclusions }) => exclusions.map(({ index }) => `${id} ${index}`)),
    );
    expect(excluded).toEqual([["cas-4 17"], []]);
  });

  it("has an outage that was worth it: bores out of tolerance as found, none as left", async () => {
    const [before, after] = (await records())
      .filter(({ kind }) => kind === "axis-deviation")
      .map(({ response }) => axisDeviationResponse.parse(response).result.summary);
    expect(before?.exceeds).toBeGreaterThan(5);
    expect(after).toMatchObject({ exceeds: 0, undecided: 0 });
  });

  it("has records that replay to the same answer", async () => {
    const token = await signIn("engineer");
    for (const { id } of await records()) {
      const path = `/v1/calculations/${id}/replay`;
      const answer = await app.call().post(path).set("Authorization", `Bearer ${token}`);

      expect(answer.body).toMatchObject({ same: true, differences: [] });
    }
  });

  it("is made once: a second start adds nothing, and says where the sign-ins are", async () => {
    const before = await counts();
    expect(await seed()).toEqual([`The demo's sign-ins are in ${file}.`]);
    expect(await counts()).toEqual(before);
    await signIn("admin");
  });

  it("prints one curl line that works when it is pasted", async () => {
    const lines = first.filter((line) => line.trim().startsWith("curl "));
    expect(lines).toHaveLength(1);
    const before = await counts();
    const { code, stdout } = await runProgram(["sh", "-c", lines[0] ?? ""], {});
    expect(code).toBe(0);
    const { kind, result } = JSON.parse(stdout) as {
      kind: string;
      result: { bores: { diameter: number }[] };
    };
    expect(kind).toBe("bore-fit");
    expect(Math.abs((result.bores[0]?.diameter ?? 0) - 360) < 0.05).toBe(true); // mm: points at 180 mm
    expect((await counts())[3]).toBe(before[3] + 1);
  });
});

describe("a first start with the demo that is cut short", () => {
  it.each([
    ["in the outage", 4, { calculations: 0, machines: 0 }],
    ["in the job's plan", 12, { calculations: 6, machines: 0 }],
    ["in the job's last survey", 14, { calculations: 6, machines: 0 }],
  ])("%s leaves nothing of that part, and the next makes it whole", async (_where, calls, left) => {
    const folder = mkdtempSync(join(tmpdir(), "borewright-demo-"));
    const app = await openListeningApp({ DATA_DIR: folder });
    const { compute, database } = app.deps;
    const { calculations, machines, jobs } = database.models;
    let ran = 0;
    class Cutting extends ComputePool {
      override run<Request>(kind: CalculationKind<Request, object>, request: Request) {
        ran += 1;
        return ran === calls ? Promise.reject(new Error("cut short")) : compute.run(kind, request);
      }
    }
    const cutting = new Cutting();
    const broken = { ...app.deps, compute: cutting };
    await expect(seedDemo(broken, app.url, () => undefined)).rejects.toThrow("cut short");
    expect({ calculations: await calculations.count(), machines: await machines.count() }).toEqual(left);
    await seedDemo(app.deps, app.url, () => undefined);
    expect(await calculations.count()).toBe(12);
    expect((await jobs.findAll()).map(({ state }) => state)).toEqual(["signed"]);
    await app.close();
    rmSync(folder, { recursive: true });
  });

  it("is completed by the next: its sign-ins still work, key and records are there", async () => {
    const folder = mkdtempSync(join(tmpdir(), "borewright-demo-"));
    const app = await openListeningApp({ DATA_DIR: folder });
    const cut = () => {
      throw new Error("cut short");
    };
    const broken = { ...app.deps, secrets: { ...app.deps.secrets, hash: cut } };
    await expect(seedDemo(broken, app.url, () => undefined)).rejects.toThrow("cut short");
    await seedDemo(app.deps, app.url, () => undefined);
    const kept = readFileSync(join(folder, "demo-sign-ins.txt"), "utf8");
    const [, email, password] = /^ {2}admin +(\S+) {2}(\S+)$/m.exec(kept) ?? [];
    expect((await app.call().post("/v1/sessions").send({ email, password })).status).toBe(201);
    const [, secret] = /Bearer (\w+)/.exec(kept) ?? [];
    const list = await app.call().get("/v1/calculations").set("Authorization", `Bearer ${secret}`);
    expect((list.body as Page).data).toHaveLength(12);
    await app.close();
    rmSync(folder, { recursive: true });
  });
});
