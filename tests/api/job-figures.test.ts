import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";

interface FigureList {
  readonly data: readonly {
    id: string;
    title: string;
    survey: string | null;
    station: string | null;
    href: string;
  }[];
}

describe("the figures of a job over HTTP", () => {
  let app: TestApp;
  let job: JobDriver;
  beforeAll(async () => {
    app = await openTestApp();
    job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.runToSignature();
    await job.givePassword();
  }, 60_000);
  afterAll(() => app.close());

  const get = (path: string, token: string | null = job.token, accept = "*/*") => {
    const call = app.call().get(path).set("Accept", accept).buffer(true);
    return token === null ? call : call.set("Authorization", `Bearer ${token}`);
  };
  const at = (rest: string) => `/v1/jobs/${job.id}/figures${rest}`;
  const textOf = ({ text, body }: { text?: string; body: unknown }) => text ?? String(body);

  it("lists every figure with its address, and each address answers it", async () => {
    const { status, body } = await get(at(""));
    expect(status).toBe(200);
    const { data } = body as FigureList;
    expect(data.slice(0, 2).map(({ id }) => id)).toEqual(["plan-elevation", "end-view"]);
    expect(data).toHaveLength(2 + 2 * 14);
    for (const { href, title } of [data[0]!, data[1]!, data.at(-1)!]) {
      const figure = await get(href);
      expect(figure.status).toBe(200);
      expect(figure.headers["content-type"]).toBe("image/svg+xml");
      expect(textOf(figure)).toContain(`<title id="title">${title}</title>`);
    }
  });

  it("answers the same bytes and tag for the same record, and others once it is signed", async () => {
    const [first, again] = [await get(at("/end-view.svg")), await get(at("/end-view.svg"))];
    expect(textOf(again)).toBe(textOf(first));
    expect(again.headers["etag"]).toBe(first.headers["etag"]);
    expect(textOf(first)).toContain("DRAFT, not signed");
    await job.sign();
    const signed = await get(at("/end-view.svg"));
    expect(textOf(signed)).not.toContain("DRAFT");
    expect(signed.headers["etag"]).not.toBe(first.headers["etag"]);
  });

  it("answers the figure of the revision asked for", async () => {
    const { body } = await get(at("?revision=1"));
    expect((body as FigureList).data[0]?.href).toBe(at("/plan-elevation.svg?revision=1"));
    expect((await get(at("/plan-elevation.svg?revision=1"))).status).toBe(200);
    expect((await get(at("/plan-elevation.svg?revision=9"))).status).toBe(404);
    expect((await get(at("?revision=9"))).status).toBe(404);
  });

  it.each([
    ["/bore-1-999.svg", 404],
    ["/bore-9-1.svg", 404],
    ["/nothing.svg", 404],
    ["/plan-elevation.png", 404],
    ["/plan-elevation.svg?page=2", 400],
  ])("refuses %s with %d", async (path, status) => {
    expect((await get(at(path))).status).toBe(status);
  });

  it("refuses another form, and a caller without a key", async () => {
    expect((await get(at("/end-view.svg"), job.token, "text/csv")).status).toBe(406);
    expect((await get(at("/end-view.svg"), null)).status).toBe(401);
    expect((await get(at(""), null)).status).toBe(401);
  });

  it("are for who may read jobs", async () => {
    const { secret } = await job.works.key("calculations:read");
    for (const path of ["", "/end-view.svg"]) expect((await get(at(path), secret)).status).toBe(403);
    const reader = await job.works.key("jobs:read");
    expect((await get(at("/end-view.svg"), reader.secret)).status).toBe(200);
  });

  it("are none of a job that has no survey yet", async () => {
    const begun = new JobDriver(app, job.works);
    await begun.start();
    const { body } = await get(`/v1/jobs/${begun.id}/figures`);
    expect(body).toEqual({ data: [] });
    expect((await get(`/v1/jobs/${begun.id}/figures/end-view.svg`)).status).toBe(404);
  });
});
