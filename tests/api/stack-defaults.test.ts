import { createServer, type Server } from "node:http";
import { connect, type AddressInfo } from "node:net";
import { once } from "node:events";
import { gzipSync } from "node:zlib";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { z } from "zod";
import { computeOutcome } from "../../server/services/compute-outcome.ts";
import { schemaFaults } from "../../server/http/schema-faults.ts";
import { answerClientError } from "../../server/http/answer-client-error.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, smallBoreFit, type TestOrganisation } from "../support/factories.ts";

/** What the bare stack would let pass or answer in its own way, and what must become of it. One test a row. */
describe("defaults of the stack that must not show", () => {
  let app: TestApp;
  let works: TestOrganisation;
  let server: Server;
  let port: number;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
    server = createServer(app.app).on("clientError", answerClientError).listen(0, "127.0.0.1");
    await once(server, "listening");
    port = (server.address() as AddressInfo).port;
  });
  afterAll(async () => {
    server.closeAllConnections();
    server.close();
    await app.close();
  });

  /** Bytes as they are: supertest would make JSON of a Buffer. */
  const postBytes = async (bytes: Buffer, headers: Record<string, string> = {}) => {
    const answer = await fetch(`http://127.0.0.1:${port}/v1/bore-fits`, {
      method: "POST",
      headers: {
        Authorization: `Bearer ${works.tokens.engineer}`,
        "Content-Type": "application/json",
        ...headers,
      },
      body: new Uint8Array(bytes),
    });
    return {
      status: answer.status,
      headers: { "content-type": answer.headers.get("Content-Type") },
      text: await answer.text(),
    };
  };
  const post = (text: string, type = "application/json", headers: Record<string, string> = {}) =>
    app
      .call()
      .post("/v1/bore-fits")
      .set("Authorization", `Bearer ${works.tokens.engineer}`)
      .set({ "Content-Type": type, ...headers })
      .send(text);
  const withPoint = (h: string) => JSON.stringify(smallBoreFit).replace('"h":0.1', `"h":${h}`);
  const fault = (pointer: string, code: string) => expect.objectContaining({ pointer, code }) as object;
  const firstH = "/bores/0/points/0/h";

  it("refuses 1e400, which would become Infinity and then null", async () => {
    const { status, body } = await post(withPoint("1e400"));
    expect(status).toBe(422);
    expect(body).toMatchObject({ code: "number_not_finite", errors: [fault(firstH, "number_not_finite")] });
  });

  it("refuses 1e-400, which would become 0, and 9007199254740993, which would be rounded", async () => {
    expect((await post(withPoint("1e-400"))).body).toMatchObject({
      errors: [fault(firstH, "number_not_finite")],
    });
    expect((await post(withPoint("9007199254740993"))).body).toMatchObject({
      errors: [fault(firstH, "number_not_exact")],
    });
  });

  it("takes -0 and hashes it as 0", async () => {
    const minus = await post(withPoint("-0"));
    const plain = await post(withPoint("0"));
    expect(minus.status).toBe(201);
    expect((minus.body as { inputHash: string }).inputHash).toBe(
      (plain.body as { inputHash: string }).inputHash,
    );
  });

  it("makes a coded failure of a result that JSON cannot hold", async () => {
    const outcome = await computeOutcome({ answer: () => ({ result: { diameter: Number.NaN } }) }, {});
    expect(outcome).toMatchObject({ status: "failed", faults: [{ code: "result_overflow" }] });
  });

  it("refuses a member that stands twice, with its pointer", async () => {
    const { status, body } = await post(withPoint('1, "h": 2'));
    expect(status).toBe(400);
    expect(body).toMatchObject({ code: "duplicate_key", errors: [fault(firstH, "duplicate_key")] });
  });

  it("refuses a body that is not declared as JSON in UTF-8", async () => {
    for (const type of [
      "text/plain",
      "application/x-www-form-urlencoded",
      "application/json; charset=latin1",
      "",
    ]) {
      const { status, body } = await post(JSON.stringify(smallBoreFit), type);
      expect(status).toBe(415);
      expect(body).toMatchObject({ code: "media_type_unsupported" });
    }
    expect((await post(JSON.stringify(smallBoreFit), "application/json; charset=utf-8")).status).toBe(201);
  });

  it("answers malformed JSON, wrong UTF-8, a byte order mark and broken gzip as problems without a stack", async () => {
    const answers = await Promise.all([
      post('{"units":'),
      postBytes(Buffer.from([0x7b, 0x22, 0xff, 0x22, 0x7d])),
      post(`\uFEFF${JSON.stringify(smallBoreFit)}`),
      postBytes(Buffer.from("not gzip"), { "Content-Encoding": "gzip" }),
      post("{}", "application/json", { "Content-Encoding": "rot13" }),
    ]);
    expect(answers.map(({ status }) => status)).toEqual([400, 400, 400, 400, 415]);
    for (const { headers, text } of answers) {
      expect(headers["content-type"]).toContain("application/problem+json");
      expect(text).not.toMatch(/node_modules|at .+\.ts|\.js:\d/);
    }
  });

  it("counts the limit of a body after decompression: a gzip bomb is 413", async () => {
    const bomb = gzipSync(Buffer.alloc(50 * 1024 * 1024, 32));
    const { status, text } = await postBytes(bomb, { "Content-Encoding": "gzip" });
    expect(status).toBe(413);
    expect(JSON.parse(text)).toMatchObject({ code: "call_too_large", limit: 4 * 1024 * 1024 });
  });

  it("answers 405 with Allow for a method that a known path does not take", async () => {
    const { status, headers, body } = await app.call().delete("/v1/calculations");
    expect(status).toBe(405);
    expect(headers.allow).toBe("GET, HEAD");
    expect(body).toMatchObject({ code: "method_not_allowed" });
    const overridden = await app.call().get("/v1/bore-fits").set("X-HTTP-Method-Override", "POST");
    expect(overridden.headers.allow).toBe("POST");
  });

  it("tells a path only by its exact form", async () => {
    for (const path of [
      "/V1/calculations",
      "/v1/calculations/",
      "//v1/calculations",
      "/v1/calculations;x",
      "/v1/%2e%2e/v1/keys",
    ]) {
      for (const accept of ["*/*", "application/json", "text/html"]) {
        const answer = await app
          .call()
          .get(path)
          .set({ Authorization: `Bearer ${works.tokens.admin}`, Accept: accept });
        expect([path, accept, answer.status]).toEqual([path, accept, 404]);
      }
    }
  });

  it("refuses nesting past 32 levels, however little text it takes, and takes 32", async () => {
    const nested = (depth: number) => `${"[".repeat(depth)}${"]".repeat(depth)}`;
    expect((await post(nested(2000))).body).toMatchObject({ status: 400, code: "too_deep", limit: 32 });
    expect((await post(nested(33))).body).toMatchObject({ code: "too_deep" });
    expect((await post(nested(32))).body).toMatchObject({ status: 422, code: "wrong_type" });
  });

  it("never makes a number of text or null", async () => {
    for (const h of ['""', "null", '"0x10"', '" 12 "', '"1,5"', "true"]) {
      const { status, body } = await post(withPoint(h));
      expect(status).toBe(422);
      expect(body).toMatchObject({ errors: [fault(firstH, "wrong_type")] });
    }
  });

  it("refuses unknown, repeated and nested query parameters and wrong percent-encoding", async () => {
    const get = (query: string) =>
      app.call().get(`/v1/calculations${query}`).set("Authorization", `Bearer ${works.tokens.admin}`);
    expect((await get("?b[c]=1")).body).toMatchObject({
      status: 400,
      code: "unknown_parameter",
      errors: [{ parameter: "b[c]" }],
    });
    expect((await get("?kind=bore-fit&kind=shim-move")).body).toMatchObject({
      status: 400,
      code: "invalid_parameter",
    });
    expect((await get("?q=%E0%A4%A")).body).toMatchObject({ status: 400, code: "invalid_encoding" });
    expect((await get("?kind=nonsense")).body).toMatchObject({
      status: 400,
      errors: [{ parameter: "kind" }],
    });
    expect(
      (await app.call().get("/v1/calculations/%E0%A4%A").set("Authorization", `Bearer ${works.tokens.admin}`))
        .status,
    ).toBe(400);
  });

  it("does not say what it is built with, and sends no weak ETag of its own", async () => {
    const { headers } = await app.call().get("/livez");
    expect(headers["x-powered-by"]).toBeUndefined();
    expect(headers.etag).toBeUndefined();
    expect(headers["x-content-type-options"]).toBe("nosniff");
    expect(headers["content-security-policy"]).toContain("frame-ancestors 'none'");
    expect(headers["content-security-policy"]).not.toMatch(/unsafe|upgrade-insecure/);
    expect(headers["strict-transport-security"]).toBeUndefined();
  });

  it("refuses unknown members, __proto__ and constructor among them, each with its pointer", async () => {
    const text = JSON.stringify({ ...smallBoreFit, role: "admin" }).replace(
      '{"units"',
      '{"__proto__": {"x": 1}, "constructor": 1, "units"',
    );
    const { status, body } = await post(text);
    expect(status).toBe(422);
    const pointers = (body as { errors: { pointer: string; code: string }[] }).errors
      .filter(({ code }) => code === "unknown_field")
      .map(({ pointer }) => pointer);
    expect(pointers.sort()).toEqual(["/__proto__", "/constructor", "/role"]);
    expect(Object.prototype).not.toHaveProperty("x");
  });

  it("refuses NUL and half a surrogate pair in text", async () => {
    for (const note of ["a\\u0000b", "a\\ud800b"]) {
      const { body } = await post(JSON.stringify({ ...smallBoreFit, note: "?" }).replace('"?"', `"${note}"`));
      expect(body).toMatchObject({ status: 422, errors: [fault("/note", "text_invalid")] });
    }
  });

  it("quotes limits in the unit of the caller, and cuts long text it echoes", async () => {
    const inches = { ...smallBoreFit, units: { axial: "in", bore: "in", offset: "mil" } };
    const { body } = await post(JSON.stringify(inches).replace('"h":0.1', '"h":1e11'));
    expect(body).toMatchObject({
      errors: [
        {
          pointer: firstH,
          code: "out_of_range",
          value: 1e11,
          unit: "in",
          allowed: { min: -1e10, max: 1e10, unit: "in" },
        },
      ],
    });
    const [long] = schemaFaults(z.strictObject({ a: z.enum(["x"]) }), { a: "y".repeat(500) });
    expect(String(long?.value)).toHaveLength(101);
  });

  it("requires units and seen, and says which", async () => {
    const { units: _, seen: __, ...rest } = smallBoreFit;
    const { body } = await post(JSON.stringify(rest));
    expect(body).toMatchObject({
      status: 422,
      errors: [fault("/units", "units_missing"), fault("/seen", "required")],
    });
  });

  it("keeps a request id that can stand in a log, and no other", async () => {
    const kept = await app.call().get("/livez").set("X-Request-Id", "deck-7.a_b");
    expect(kept.headers["x-request-id"]).toBe("deck-7.a_b");
    const replaced = await app.call().get("/livez").set("X-Request-Id", "bad id {}");
    expect(replaced.headers["x-request-id"]).toMatch(/^[0-9a-f-]{36}$/);
  });

  it("names the served revision on every answer and refuses another", async () => {
    expect((await app.call().get("/livez")).headers["api-version"]).toBe("2026-12-01");
    const refused = await app.call().get("/v1/meta").set("Api-Version", "1999-01-01");
    expect(refused.body).toMatchObject({
      status: 400,
      code: "invalid_header",
      errors: [{ header: "Api-Version" }],
    });
  });

  it("answers what is no HTTP as a problem and closes", async () => {
    expect(await exchange("NONSENSE\r\n\r\n")).toMatch(/^HTTP\/1\.1 400 [\s\S]+"code":"malformed_request"/);
    expect(await exchange(`GET /livez HTTP/1.1\r\nHost: x\r\nX-Big: ${"a".repeat(20_000)}\r\n\r\n`)).toMatch(
      /^HTTP\/1\.1 431 /,
    );
    const twice = await exchange(
      `GET /v1/me HTTP/1.1\r\nHost: x\r\nConnection: close\r\nAuthorization: Bearer a\r\nAuthorization: Bearer b\r\n\r\n`,
    );
    expect(twice).toMatch(/^HTTP\/1\.1 400 [\s\S]+"code":"invalid_header"/);
    const smuggled = await exchange(
      `POST /v1/bore-fits HTTP/1.1\r\nHost: x\r\nContent-Length: 5\r\nTransfer-Encoding: chunked\r\n\r\n0\r\n\r\n`,
    );
    expect(smuggled).toMatch(/^HTTP\/1\.1 400 /);
  });

  async function exchange(text: string): Promise<string> {
    const socket = connect(port, "127.0.0.1");
    socket.setEncoding("utf8").write(text);
    let answer = "";
    for await (const chunk of socket) answer += String(chunk);
    return answer;
  }
});
