import { asFoundReadings } from "../../server/demo/fellgate-job.ts";
import type { IndicationAnswer } from "../../shared/schemas/indications.ts";
import type { JobRecord } from "../../shared/schemas/jobs.ts";
import type { TestApp } from "./app.ts";
import { makeOrganisation } from "./factories.ts";
import { JobDriver } from "./fellgate-job.ts";

const component = "compressor-casing";
const at = "2026-11-06T10:05:00Z";

/** A job whose compressor casing is to be moved as its plan says. */
export class PlannedMove {
  constructor(
    readonly job: JobDriver,
    readonly record: JobRecord,
    readonly plan: string,
  ) {}

  static async make(app: TestApp): Promise<PlannedMove> {
    const job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.start();
    const survey = await job.survey("as_found", asFoundReadings());
    const plan = await job.add("/plans", { survey });
    return new PlannedMove(job, await job.read(), plan);
  }

  /** What shall be moved at each support. */
  get planned() {
    const { components } = this.record.plans[0]?.result ?? { components: [] };
    return components.find(({ id }) => id === component)?.realised ?? [];
  }

  /** A sight of a bore, moved so far from where the survey had it. */
  sight(station: string, moved: { readonly h: number; readonly v: number }) {
    const fit = this.record.surveys[0]?.result?.fits.find(({ id }) => id === station);
    return { station, centre: { h: (fit?.centre.h ?? 0) + moved.h, v: (fit?.centre.v ?? 0) + moved.v } };
  }

  /** The casing's sights when it has come `share` of the way. */
  sights(share: number) {
    const { machine } = this.record;
    const [first, last] = [this.planned[0], this.planned.at(-1)];
    const supports = machine.components?.find(({ id }) => id === component)?.supports ?? [];
    const [from, to] = [supports[0]?.z ?? 0, supports.at(-1)?.z ?? 1];
    return ["cas-1", "cas-5"].map((station) => {
      const z = machine.stations.find(({ id }) => id === station)?.z ?? 0;
      const between = (plane: "h" | "v") =>
        share *
        ((first?.[plane] ?? 0) + ((z - from) / (to - from)) * ((last?.[plane] ?? 0) - (first?.[plane] ?? 0)));
      return this.sight(station, { h: between("h"), v: between("v") });
    });
  }

  /** An indication of the casing, as it is sent. */
  indication<Members extends object>(members: Members) {
    return { plan: this.plan, component, at, ...members };
  }

  async indicate(members: object) {
    const path = `/v1/jobs/${this.job.id}/indications`;
    const { status, body } = await this.job.post(path, this.indication(members));
    return { status, answer: body as unknown as IndicationAnswer };
  }
}
