import { limits } from "../../shared/limits.ts";
import { createHash } from "node:crypto";
import writeExcelFile from "write-excel-file/node";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { asFoundReadings } from "../../server/demo/fellgate-job.ts";
import type { Reading } from "../../shared/schemas/job-entries.ts";
import type { ReadingPreview } from "../../shared/schemas/reading-files.ts";
import { alterPart } from "../support/altered-workbook.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { JobDriver } from "../support/fellgate-job.ts";

const head = "station,form,taken at,person,upper half,sense,zero,gauge sag (mm),clock (deg),reading (mm)";
const four = (station: string, readings: readonly (string | number)[], at = "2026-11-04T07:40:00Z") =>
  readings.map(
    (reading, index) =>
      `${station},turned_gauge,${at},Ines Alder,on,larger_is_farther,nominal,0.02,${(index % 4) * 90},${reading}`,
  );
const sound = [head, ...four("brg-1", [0.12, 0.05, -0.1, -0.03])].join("\r\n");

describe("files of readings", () => {
  let app: TestApp;
  let job: JobDriver;
  let survey: string;
  beforeAll(async () => {
    app = await openTestApp();
    job = new JobDriver(app, await makeOrganisation(app.deps));
    await job.start();
    survey = await job.add("/surveys", { stage: "as_found", sameSetUp: false });
  });
  afterAll(() => app.close());

  const send = async (
    kind: "reading-previews" | "reading-files",
    content: string | Buffer,
    query = "",
    mediaType = "text/csv",
  ) => {
    const { status, body } = await app
      .call()
      .post(`/v1/jobs/${job.id}/surveys/${survey}/${kind}?name=readings.csv${query}`)
      .set("Authorization", `Bearer ${job.token}`)
      .set("Content-Type", mediaType)
      .send(content);
    return { status, body: body as Record<string, unknown> };
  };
  const preview = async (content: string | Buffer, query = "") =>
    (await send("reading-previews", content, query)).body as unknown as ReadingPreview;
  const faults = async (content: string | Buffer, query = "") =>
    (await preview(content, query)).faults.map(({ line, column, code }) => [line, column, code]);

  it("previews what each column is and each reading holds, and stores nothing", async () => {
    const before = (await job.read()).version;
    const { faults: none, readings, columns, delimiter, decimal } = await preview(sound);
    expect(none).toEqual([]);
    expect([delimiter, decimal]).toEqual([",", "point"]);
    expect(columns.at(-1)).toEqual({ header: "reading (mm)", column: "reading", unit: "mm" });
    expect(readings).toEqual([
      {
        station: "brg-1",
        form: "turned_gauge",
        takenAt: "2026-11-04T07:40:00.000Z",
        person: "Ines Alder",
        upperHalf: "on",
        sense: "larger_is_farther",
        zero: "nominal",
        gaugeSag: 0.02,
        readings: [
          { clockDeg: 0, reading: 0.12 },
          { clockDeg: 90, reading: 0.05 },
          { clockDeg: 180, reading: -0.1 },
          { clockDeg: 270, reading: -0.03 },
        ],
      },
    ]);
    expect((await job.read()).version).toBe(before);
  });

  it("reads the same from semicolons with decimal commas, from tabs, with a mark at the start, in mil", async () => {
    const { readings } = await preview(sound);
    const commas = sound.replaceAll(",", ";").replaceAll(".", ",");
    expect((await preview(commas)).readings).toEqual(readings);
    expect((await preview(commas)).decimal).toBe("comma");
    expect((await preview(sound.replaceAll(",", "\t"))).readings).toEqual(readings);
    expect(
      (await preview(Buffer.concat([Buffer.from([0xef, 0xbb, 0xbf]), Buffer.from(sound)]))).readings,
    ).toEqual(readings);
    const mil = sound.replace("reading (mm)", "reading (mil)").replace(/,0\.12$/m, ",10");
    const [converted] = (await preview(mil)).readings as Extract<Reading, { form: "turned_gauge" }>[];
    // 1 mil = 0.0254 mm exactly (international inch, 1959).
    expect(converted?.readings[0]?.reading).toBe(0.254);
  });

  it("takes columns of other names for what the caller says, and leaves out what is to be ignored", async () => {
    const theirs = sound.replace("station", "Place").replace("reading (mm)", "Dial (mm),Remark");
    expect(await faults(theirs)).toContainEqual([1, "Place", "unknown_field"]);
    expect(await faults(theirs, "&columns=station=Place,reading=Dial&ignore=Remark")).toEqual([]);
    expect((await send("reading-previews", theirs, "&columns=colour=Place")).body).toMatchObject({
      status: 400,
      code: "invalid_parameter",
    });
  });

  it("refuses values under no head, where a decimal comma would have split a number", async () => {
    const trailing = sound.replaceAll("\r\n", ",\r\n").concat(",");
    expect(await faults(trailing)).toEqual([]);
    const split = [`${head},`, ...four("brg-1", ["0,12", "0,05", "-0,1", "-0,03"])].join("\n");
    expect(await faults(split)).toEqual([[2, null, "unknown_field"]]);
  });

  it("asks the columns of numbers alone which decimal sign the file has, whatever minus is written", async () => {
    const commas = sound.replaceAll(",", ";").replaceAll(".", ",");
    const remarked = commas.replaceAll("\r\n", ";1.5\r\n").replace("(mm);1.5", "(mm);Remark").concat(";1.5");
    expect(await faults(remarked, "&ignore=Remark")).toEqual([]);
    expect(await faults(commas.replaceAll("Ines Alder", "4.2"))).toEqual([]);
    const mixed = commas
      .replace(";0,12", ";0.12")
      .replaceAll(/0,02|-0,1\b|-0,03|0,05/g, (text) =>
        text.startsWith("-") ? text.replace("-", "\u2212") : "0",
      );
    expect(await faults(mixed)).toEqual([[1, null, "combination_invalid"]]);
  });

  it("names every fault once with its line and column, and takes empty for missing, never for 0", async () => {
    const lines = [
      head,
      ...four("brg-1", [0.12, "", "=1+1", '"1.234,5"']),
      ...four("brg-9", [1, 2, 3, 4], "yesterday"),
    ];
    expect(await faults(lines.join("\n"))).toEqual([
      [4, "reading (mm)", "wrong_type"],
      [5, "reading (mm)", "wrong_type"],
      ...[6, 7, 8, 9].map((line) => [line, "taken at", "wrong_type"]),
      [3, "reading", "required"],
    ]);
  });

  it("lists as many faults as a person looks through, and says how many more there are", async () => {
    const lines = [
      head,
      ...four(
        "brg-1",
        Array.from({ length: limits.faultsPerPreview + 7 }, () => "x"),
      ),
    ];
    const { faults: told } = await preview(lines.join("\n"));
    expect(told).toHaveLength(limits.faultsPerPreview + 1);
    expect(told.at(-1)).toMatchObject({
      code: "too_many_items",
      detail: expect.stringMatching(/^7 more/) as string,
    });
  });

  it("says what the engine refuses at the line where the reading begins", async () => {
    const lines = [
      head,
      ...four("brg-1", [0.1, 0, 0, 0]),
      ...four("brg-2", [0.1, 0.2], "2026-11-04T08:00:00Z"),
    ];
    expect(await faults(lines.join("\n"))).toEqual([[6, "readings", "too_few_points"]]);
    expect(await faults([head, ...four("brg-99", [0, 0, 0, 0])].join("\n"))).toEqual([
      [2, "station", "unknown_reference"],
    ]);
  });

  it.each([
    ["units left out", sound.replace("reading (mm)", "reading"), "units_missing"],
    ["a unit that is none", sound.replace("reading (mm)", "reading (furlong)"), "choice_unknown"],
    ["a column twice", sound.replace("zero", "reading (mm)"), "duplicate_id"],
    ["both decimal signs", sound.replaceAll(",", ";").replace(";0.12", ";0,12"), "combination_invalid"],
    ["an open quote", `${head}\n"brg-1,turned_gauge`, "text_invalid"],
    ["a head alone", head, "too_few_items"],
    ["latin-1 bytes", Buffer.from("station;Stra\xdfe", "latin1"), "invalid_encoding"],
    ["UTF-16", Buffer.from(`\ufeff${sound}`, "utf16le"), "invalid_encoding"],
    ["a zip archive", Buffer.concat([Buffer.from("PK\x03\x04"), Buffer.alloc(64, 0xff)]), "invalid_encoding"],
    [
      "two senses in one reading",
      sound.replace("larger_is_farther", "larger_is_nearer"),
      "combination_invalid",
    ],
  ])("refuses %s with a code", async (_what, content, code) => {
    expect((await faults(content)).map(([, , given]) => given)).toContain(code);
    const { status, body } = await send("reading-files", content);
    expect(status).toBe(code === "invalid_encoding" ? 400 : 422);
    expect((body["errors"] as { code: string }[]).map((error) => error.code)).toContain(code);
  });

  const xlsx = "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet";
  const workbookOf = (rows: (string | number | null | { type: "Formula"; value: string })[][]) =>
    writeExcelFile(
      rows.map((row) => row.map((cell) => (typeof cell === "object" ? cell : { value: cell }))) as never,
      { sheet: "Readings" },
    ).toBuffer();

  it("reads the first sheet of a workbook as it reads the same in CSV, and refuses a formula in it", async () => {
    const rows = sound
      .split("\r\n")
      .map((line) => line.split(",").map((cell) => (/^-?\d+(\.\d+)?$/.test(cell) ? Number(cell) : cell)));
    const { body } = await send("reading-previews", await workbookOf(rows), "", xlsx);
    const read = body as unknown as ReadingPreview;
    expect(read.faults).toEqual([]);
    expect(read.readings).toEqual((await preview(sound)).readings);
    const computed = [
      ...rows.slice(0, -1),
      [...(rows.at(-1)?.slice(0, -1) ?? []), { type: "Formula" as const, value: "A1+1" }],
    ];
    const refused = (await send("reading-previews", await workbookOf(computed), "", xlsx))
      .body as unknown as ReadingPreview;
    expect(refused.faults).toMatchObject([{ line: 5, code: "wrong_type" }]);
    const stored = await send("reading-files", await workbookOf(rows), "", xlsx);
    expect(stored.status).toBe(201);
  });

  it("refuses an error of the spreadsheet in a column that may be empty, rather than take it for missing", async () => {
    const rows = sound
      .split("\r\n")
      .map((line) => line.split(",").map((cell) => (/^-?\d+(\.\d+)?$/.test(cell) ? Number(cell) : cell)));
    const book = await workbookOf(rows);
    // Column H, the gauge's sag, is stated once for the reading: without it the bore would lie too high.
    const broken = alterPart(book, "xl/worksheets/sheet1.xml", (xml) =>
      xml.replaceAll(/<c r="H[2-5]"[^>]*>.*?<\/c>/g, (cell) =>
        cell.replace(/<c (r="H\d").*/, '<c $1 t="e"><v>#DIV/0!</v></c>'),
      ),
    );
    const { body } = await send("reading-previews", broken, "", xlsx);
    const read = body as unknown as ReadingPreview;
    expect(read.readings).toEqual([]);
    expect(read.faults).toMatchObject([
      { line: 2, code: "wrong_type", detail: expect.stringContaining("H2") },
    ]);
  });

  it("refuses a workbook that is none, and CSV that is sent as a workbook", async () => {
    for (const content of [Buffer.from("PK\x03\x04 no zip"), Buffer.from(sound)]) {
      const { status, body } = await send("reading-files", content, "", xlsx);
      expect([status, (body["errors"] as { code: string }[])[0]?.code]).toEqual([422, "file_not_as_stated"]);
    }
  });

  it("keeps text that looks like a formula as the text it is", async () => {
    const lines = sound.replaceAll("Ines Alder", "=HYPERLINK(A1)");
    const [reading] = (await preview(lines)).readings;
    expect(reading?.person).toBe("=HYPERLINK(A1)");
  });

  it("refuses a file of 50 MB before reading it all", async () => {
    const { status, body } = await send("reading-files", Buffer.alloc(50 * 1024 * 1024, 0x20)).catch(() => ({
      status: 413,
      body: { code: "call_too_large" },
    }));
    expect([status, body["code"]]).toEqual([413, "call_too_large"]);
  });

  it("stores a sound file with its readings, and gives its bytes back", async () => {
    const { status, body } = await send("reading-files", sound);
    expect(status).toBe(201);
    const { id, sha256 } = body["file"] as { id: string; sha256: string };
    expect(sha256).toBe(createHash("sha256").update(sound).digest("hex"));
    const stored = (await job.read()).surveys[0]?.readings.at(-1);
    expect(stored?.sourceFile).toEqual({ id, name: "readings.csv", sha256 });
    const { text } = await app
      .call()
      .get(`/v1/jobs/${job.id}/files/${id}`)
      .set("Authorization", `Bearer ${job.token}`);
    expect(text).toBe(sound);
  });

  it("takes the whole of the demo's survey as one file, and fits it as the same readings sent as JSON", async () => {
    const readings = asFoundReadings();
    const columns = `${head},h (mm),v (mm),seen,closing,nominal diameter (mm),reading uncertainty (mm)`;
    const lines = readings.flatMap((reading) => {
      const common = `${reading.station},${reading.form},${reading.takenAt},Ines Alder,on`;
      const last = `${reading.seen ?? ""},${reading.closing ? "yes" : ""},${reading.nominalDiameter},${reading.readingUncertainty}`;
      if (reading.form === "turned_gauge") {
        return reading.readings.map(
          (one) =>
            `${common},${reading.sense},${reading.zero},${reading.gaugeSag},${one.clockDeg},${one.reading},,,${last}`,
        );
      }
      if (reading.form !== "points") return [];
      return reading.points.map(({ h, v }) => `${common},,,,,,${h},${v},${last}`);
    });
    const { faults: none, readings: read } = await preview([columns, ...lines].join("\n"));
    expect(none).toEqual([]);
    const bare = (list: readonly Reading[]) =>
      list.map(({ takenAt, ...one }) => {
        const { outliers: _rule, instrument: _with, ...rest } = one as Reading & { outliers?: unknown };
        return { ...rest, at: Date.parse(takenAt) };
      });
    expect(bare(read)).toEqual(bare(readings));
  });
});
