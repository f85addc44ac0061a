import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { fellgateDocument } from "../../server/demo/fellgate-document.ts";
import { writeMachineWorkbook } from "../../server/machines/workbook/write-machine-workbook.ts";
import { limits } from "../../shared/limits.ts";
import { alterCell, textInside } from "../support/altered-workbook.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation, type TestOrganisation } from "../support/factories.ts";

const xlsx = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet";
const about = { description: "Machine", createdAt: new Date(0) };

interface Import {
  document: { name: string } | null;
  documentHash: string | null;
  faults: { sheet: string; cell: string | null; code: string }[];
  machine: { id: string; documentHash: string; revision: number } | null;
}

describe("machines as workbooks", () => {
  let app: TestApp;
  let works: TestOrganisation;
  let book: Buffer;
  beforeAll(async () => {
    app = await openTestApp();
    works = await makeOrganisation(app.deps);
    book = await writeMachineWorkbook(fellgateDocument, about);
  });
  afterAll(() => app.close());

  const get = (path: string, token = works.tokens.engineer) =>
    app
      .call()
      .get(path)
      .set("Authorization", `Bearer ${token}`)
      .buffer(true)
      .parse((response, done) => {
        const parts: Buffer[] = [];
        response.on("data", (part: Buffer) => parts.push(part));
        response.on("end", () => done(null, Buffer.concat(parts)));
      });
  const send = (query = "", content: Buffer = book, token = works.tokens.engineer) =>
    app
      .call()
      .post(`/v1/machine-imports${query}`)
      .set("Authorization", `Bearer ${token}`)
      .set("Content-Type", xlsx)
      .send(content);
  const count = () => app.deps.database.models.machines.count({ where: { organisationId: works.id } });

  describe("GET /v1/machine-template", () => {
    it("is a workbook in the units asked for, the same again and again", async () => {
      const [first, again] = [await get("/v1/machine-template"), await get("/v1/machine-template?axial=mm")];
      expect(first.status).toBe(200);
      expect(first.headers["content-type"]).toBe(xlsx);
      expect(first.headers["content-disposition"]).toBe('attachment; filename="machine-template.xlsx"');
      expect((first.body as Buffer).equals(again.body as Buffer)).toBe(true);
      const inches = await get("/v1/machine-template?axial=in&bore=in&offset=mil");
      expect((inches.body as Buffer).equals(first.body as Buffer)).toBe(false);
    });

    it("refuses a unit that it does not know, and a caller without a credential", async () => {
      expect((await get("/v1/machine-template?axial=furlong")).status).toBe(400);
      expect((await app.call().get("/v1/machine-template")).status).toBe(401);
    });
  });

  describe("POST /v1/machine-imports", () => {
    it("previews the document and stores nothing", async () => {
      const before = await count();
      const { status, body } = await send();
      const { document, documentHash, faults, machine } = body as Import;
      expect(status).toBe(200);
      expect(document).toEqual(fellgateDocument);
      expect(documentHash).toMatch(/^sha256:[0-9a-f]{64}$/);
      expect([faults, machine]).toEqual([[], null]);
      expect(await count()).toBe(before);
    });

    it("stores the machine where asked, and its export is imported to the same hash", async () => {
      const { status, body, headers } = await send("?store=true");
      const { machine, documentHash } = body as Import;
      expect(status).toBe(200);
      expect(machine?.revision).toBe(1);
      expect(machine?.documentHash).toBe(documentHash);
      expect(headers.location).toBe(`/v1/machines/${machine?.id}`);
      const row = await app.deps.database.models.machines.findByPk(machine?.id ?? "");
      expect(row?.name).toBe("Fellgate Unit 2");
      const exported = await get(`/v1/machines/${machine?.id}/workbook`);
      expect(exported.status).toBe(200);
      expect(exported.headers["content-type"]).toBe(xlsx);
      expect(exported.headers.etag).toMatch(/^"[0-9a-f]{64}"$/);
      const again = (await send("", exported.body as Buffer)).body as Import;
      expect(again.documentHash).toBe(documentHash);
    });

    it("tells faults by sheet and cell, and stores nothing with one", async () => {
      const before = await count();
      const faulty = alterCell(book, "Stations", "D3", textInside("620,5"));
      const preview = await send("", faulty);
      expect(preview.status).toBe(200);
      expect((preview.body as Import).faults).toMatchObject([
        { sheet: "Stations", cell: "D3", code: "wrong_type" },
      ]);
      expect((preview.body as Import).document).toBeNull();
      const stored = await send("?store=true", faulty);
      expect(stored.status).toBe(422);
      expect(stored.body).toMatchObject({
        code: "wrong_type",
        errors: [{ pointer: "/sheets/Stations/D3", code: "wrong_type" }],
      });
      expect(await count()).toBe(before);
    });

    it("stores once under one Idempotency-Key", async () => {
      const before = await count();
      const [first, again] = [
        await send("?store=true").set("Idempotency-Key", "import-once"),
        await send("?store=true").set("Idempotency-Key", "import-once"),
      ];
      expect((again.body as Import).machine?.id).toBe((first.body as Import).machine?.id);
      expect(await count()).toBe(before + 1);
    });

    it("takes a preview and a store under one key for two calls", async () => {
      const preview = await send().set("Idempotency-Key", "preview-first");
      expect(preview.status).toBe(200);
      const stored = await send("?store=true").set("Idempotency-Key", "preview-first");
      expect(stored.body).toMatchObject({ status: 422, code: "idempotency_key_reused" });
    });

    it("refuses what is no workbook, what is too large, and other media types", async () => {
      expect((await send("", Buffer.from("station,z"))).body).toMatchObject({
        status: 422,
        code: "file_not_as_stated",
      });
      const large = await send("", Buffer.alloc(limits.workbookBytes + 1));
      expect(large.status).toBe(413);
      const csv = await app
        .call()
        .post("/v1/machine-imports")
        .set("Authorization", `Bearer ${works.tokens.engineer}`)
        .set("Content-Type", "text/csv")
        .send("a,b");
      expect(csv.status).toBe(415);
      expect((await send("?store=perhaps")).status).toBe(400);
    });

    it("is for those who may describe machines", async () => {
      expect((await send("", book, works.tokens.viewer)).status).toBe(403);
      expect((await app.call().post("/v1/machine-imports").set("Content-Type", xlsx).send(book)).status).toBe(
        401,
      );
    });
  });

  describe("GET /v1/machines/{id}/workbook", () => {
    it("hides another organisation's machine", async () => {
      const stranger = await makeOrganisation(app.deps);
      const { machine } = (await send("?store=true")).body as Import;
      expect((await get(`/v1/machines/${machine?.id}/workbook`, stranger.tokens.engineer)).status).toBe(404);
      expect((await get(`/v1/machines/${machine?.id}/workbook`, works.tokens.viewer)).status).toBe(200);
    });
  });
});
