import { QueryTypes } from "sequelize";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { migrate, unmigrate } from "../../server/database.ts";
import { inTransaction } from "../../server/services/in-transaction.ts";
import { timeOfId } from "../../server/services/ids.ts";
import { writeRecords, type RecordEntry } from "../../server/services/write-records.ts";
import { migrations } from "../../server/migrations/index.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";

describe("the tables", () => {
  let app: TestApp;
  beforeAll(async () => {
    app = await openTestApp();
  });
  afterAll(() => app.close());
  const select = <Row extends object>(sql: string) =>
    app.deps.database.sequelize.query<Row>(sql, { type: QueryTypes.SELECT });

  const store = (...entries: RecordEntry[]) =>
    inTransaction(app.deps.database.sequelize, (transaction) =>
      writeRecords(
        app.deps.database,
        entries.map((entry) => ({ entry, deliveries: [] })),
        transaction,
      ),
    );

  it("are InnoDB and have a primary key, each of them", async () => {
    const tables = await select<{ name: string; engine: string; keys: string }>(
      `SELECT t.TABLE_NAME AS name, t.ENGINE AS engine, (SELECT COUNT(*) FROM information_schema.TABLE_CONSTRAINTS c
         WHERE c.TABLE_SCHEMA = t.TABLE_SCHEMA AND c.TABLE_NAME = t.TABLE_NAME AND c.CONSTRAINT_TYPE = 'PRIMARY KEY') AS \`keys\`
       FROM information_schema.TABLES t WHERE t.TABLE_SCHEMA = DATABASE()`,
    );
    expect(tables.length).toBeGreaterThanOrEqual(9);
    for (const { name, engine, keys } of tables)
      expect([name, engine, Number(keys)]).toEqual([name, "InnoDB", 1]);
  });

  it("let calculations be partitioned by month: the key begins with createdAt, and nothing else is unique or refers", async () => {
    const constraints = await select<{ type: string; columns: string }>(
      `SELECT c.CONSTRAINT_TYPE AS type, GROUP_CONCAT(k.COLUMN_NAME ORDER BY k.ORDINAL_POSITION) AS columns
       FROM information_schema.TABLE_CONSTRAINTS c JOIN information_schema.KEY_COLUMN_USAGE k USING (CONSTRAINT_SCHEMA, CONSTRAINT_NAME, TABLE_NAME)
       WHERE c.TABLE_SCHEMA = DATABASE() AND c.TABLE_NAME = 'calculations' AND c.CONSTRAINT_TYPE <> 'CHECK' GROUP BY c.CONSTRAINT_NAME, c.CONSTRAINT_TYPE`,
    );
    expect(constraints).toEqual([{ type: "PRIMARY KEY", columns: "createdAt,id" }]);
    await app.deps.database.sequelize.query(`CREATE TABLE partitioned LIKE calculations`);
    await app.deps.database.sequelize.query(
      `ALTER TABLE partitioned PARTITION BY RANGE COLUMNS (createdAt) (PARTITION p1 VALUES LESS THAN ('2027-01-01'), PARTITION rest VALUES LESS THAN (MAXVALUE))`,
    );
    await app.deps.database.sequelize.query(`DROP TABLE partitioned`);
  });

  it("find a record by id through the primary key, and a list through its index", async () => {
    const explain = async (sql: string) => (await select<{ key: string }>(`EXPLAIN ${sql}`))[0]?.key;
    const id = app.deps.newId();
    // A row that is not there is told from the key alone, so one is made.
    await app.deps.database.sequelize.query(
      `INSERT INTO calculations SELECT '2026-01-01', '${id}', '${id}', 'bore-fit', 'failed', 't', 1, '', '', '', '', NULL, NULL, NULL, '', NULL, NULL`,
    );
    expect(
      await explain(
        `SELECT * FROM calculations WHERE createdAt = '2026-01-01' AND id = '${id}' AND organisationId = '${id}'`,
      ),
    ).toBe("PRIMARY");
    expect(
      await explain(
        `SELECT id FROM calculations WHERE organisationId = '${id}' ORDER BY createdAt DESC, id DESC LIMIT 50`,
      ),
    ).toBe("calculations_list");
  });

  it("give back every double and every character as they were stored", async () => {
    const { id: organisationId } = await makeOrganisation(app.deps);
    const answer = {
      sums: [0.1 + 0.2, 5e-324, 1.797e308, -123456789.12345679, 1 / 3],
      text: "µ Ø ± − 行 🔧 '\"\\",
    };
    const id = app.deps.newId();
    const entry: RecordEntry = {
      createdAt: timeOfId(id) ?? new Date(),
      id,
      organisationId,
      kind: "bore-fit",
      status: "succeeded",
      engineVersion: "test",
      durationMs: 0.1 + 0.2,
      requestText: "{}",
      requestCanonical: "{}",
      inputHash: "sha256:0",
      answerText: JSON.stringify(answer),
      resultHash: null,
      memberId: null,
      keyId: null,
      requestId: "r",
      note: answer.text,
      jobId: null,
      endpoint: "/v1/bore-fits",
      httpStatus: 201,
      claim: null,
    };
    await store(entry, { ...entry, id: app.deps.newId(), note: null });
    const row = await app.deps.database.models.calculations.findOne({ where: { id, organisationId } });
    expect(JSON.parse(row?.answerText ?? "")).toEqual(answer);
    expect(row?.durationMs).toBe(0.1 + 0.2);
    expect(row?.note).toBe(answer.text);
    expect(row?.createdAt).toEqual(timeOfId(id));
    expect(await app.deps.database.models.calculations.count({ where: { organisationId } })).toBe(2);
  });

  it("keep all of a batch of records or nothing", async () => {
    const { id: organisationId } = await makeOrganisation(app.deps);
    const id = app.deps.newId();
    const entry = {
      id,
      organisationId,
      createdAt: new Date(),
      kind: "bore-fit",
      status: "succeeded",
      engineVersion: "t",
      durationMs: 1,
      requestText: "{}",
      requestCanonical: "{}",
      inputHash: "h",
      answerText: "{}",
      resultHash: null,
      memberId: null,
      keyId: null,
      requestId: "r",
      note: null,
      jobId: null,
      endpoint: "/v1/bore-fits",
      httpStatus: 201,
      claim: null,
    } satisfies RecordEntry;
    await expect(store(entry, entry)).rejects.toThrow();
    const left = await select<{ rows: string }>(
      `SELECT (SELECT COUNT(*) FROM calculations WHERE organisationId = '${organisationId}') + (SELECT COUNT(*) FROM usage_events WHERE organisationId = '${organisationId}') AS \`rows\``,
    );
    expect(Number(left[0]?.rows)).toBe(0);
  });

  it("run a transaction again when the database undid it for a deadlock", async () => {
    const { sequelize } = app.deps.database;
    await sequelize.query("CREATE TABLE locks (id INT PRIMARY KEY, n INT NOT NULL) ENGINE=InnoDB");
    await sequelize.query("INSERT INTO locks VALUES (1, 0), (2, 0)");
    let attempts = 0;
    const cross = (first: number, second: number) =>
      inTransaction(sequelize, async (transaction) => {
        attempts += 1;
        await sequelize.query(`UPDATE locks SET n = n + 1 WHERE id = ${first}`, { transaction });
        await new Promise((resolve) => setTimeout(resolve, 50));
        await sequelize.query(`UPDATE locks SET n = n + 1 WHERE id = ${second}`, { transaction });
      });
    await Promise.all([cross(1, 2), cross(2, 1)]);
    expect(attempts).toBeGreaterThan(2);
    expect(await select("SELECT n FROM locks")).toEqual([{ n: 2 }, { n: 2 }]);
  });

  it("come and go: each migration has a way back, and running them twice runs nothing", async () => {
    const own = await openTestApp();
    try {
      expect(await migrate(own.deps.database)).toEqual([]);
      await unmigrate(own.deps.database);
      expect((await own.call().get("/readyz")).status).toBe(503);
      expect(await migrate(own.deps.database)).toEqual(Object.keys(migrations));
      expect((await own.call().get("/readyz")).status).toBe(200);
    } finally {
      await own.close();
    }
  });
});
