import { hashPassword } from "../../server/services/passwords.ts";
import {
  asFoundReadings,
  asLeftReadings,
  fellgateChecks,
  fellgateJobDetails,
  movesAsPlanned,
} from "../../server/demo/fellgate-job.ts";
import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import type { TestApp } from "./app.ts";
import type { TestOrganisation } from "./factories.ts";

export const signingPassword = "a long and private sentence";

interface Sent {
  readonly status: number;
  readonly body: Record<string, unknown>;
}

/** Drives a job over HTTP, call by call, as one engineer. */
export class JobDriver {
  id = "";
  machineId = "";

  constructor(
    readonly app: TestApp,
    readonly works: TestOrganisation,
    readonly token = works.tokens.engineer,
  ) {}

  async post(path: string, body?: object): Promise<Sent> {
    const { status, body: answer } = await this.app
      .call()
      .post(path)
      .set("Authorization", `Bearer ${this.token}`)
      .send(body);
    return { status, body: answer as Record<string, unknown> };
  }

  /** Posts to the job, and fails where it is not taken. Answers the id of the first entry. */
  async add(path: string, body?: object): Promise<string> {
    const { status, body: answer } = await this.post(`/v1/jobs/${this.id}${path}`, body);
    if (status !== 201) throw new Error(`${path}: ${status} ${JSON.stringify(answer)}`);
    return (answer as { ids?: string[] }).ids?.[0] ?? "";
  }

  async read(): Promise<JobRecord> {
    const { body } = await this.app
      .call()
      .get(`/v1/jobs/${this.id}`)
      .set("Authorization", `Bearer ${this.token}`);
    return body as JobRecord;
  }

  async start(details: object = fellgateJobDetails, machine: object = fellgateDocument): Promise<void> {
    const made = await this.post("/v1/machines", machine);
    this.machineId = made.body["id"] as string;
    const job = await this.post("/v1/jobs", { machineId: this.machineId, details });
    if (job.status !== 201) throw new Error(JSON.stringify([made, job]));
    this.id = job.body["id"] as string;
  }

  async answerChecks(): Promise<void> {
    for (const check of fellgateChecks) await this.add("/checks", check);
  }

  async survey(stage: string, readings: readonly object[], sameSetUp = false): Promise<string> {
    const id = await this.add("/surveys", { stage, sameSetUp, instrument: "gauge-1" });
    await this.add(`/surveys/${id}/readings`, { readings });
    await this.add(`/surveys/${id}/results`);
    return id;
  }

  /** As found, plan, moves, as left, confirmed: ready to be signed. */
  async runToSignature(): Promise<{ found: string; left: string }> {
    await this.start();
    await this.answerChecks();
    const found = await this.survey("as_found", asFoundReadings());
    await this.add("/plans", { survey: found });
    const { surveys, plans } = await this.read();
    const result = surveys[0]?.result;
    const plan = plans[0]?.result;
    if (!result || !plan) throw new Error("The survey or its plan is missing.");
    for (const move of movesAsPlanned(plan)) await this.add("/moves", move);
    const left = await this.survey("as_left", asLeftReadings(result, plan), true);
    await this.add("/confirmations", { before: found, after: left });
    return { found, left };
  }

  async givePassword(): Promise<void> {
    await this.works.members.engineer.update({ passwordHash: await hashPassword(signingPassword) });
  }

  sign(password = signingPassword): Promise<Sent> {
    return this.post(`/v1/jobs/${this.id}/signature`, { password, meaning: "As left, reviewed." });
  }
}
