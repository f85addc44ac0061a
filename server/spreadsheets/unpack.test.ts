import { strToU8, zipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { alterPart } from "../../tests/support/altered-workbook.ts";
import { textCell } from "./cell.ts";
import { openWorkbook } from "./open-workbook.ts";
import { unpackLimits, unpackWorkbook, UnreadableWorkbook } from "./unpack.ts";
import { writeWorkbook } from "./write-workbook.ts";

const book = () =>
  writeWorkbook({
    title: "",
    creator: "",
    description: "",
    createdAt: new Date(0),
    pageHead: { left: "", right: "" },
    pageFoot: [],
    sheets: [{ name: "One", rows: [[textCell("a")]], widths: [10] }],
  });
const codeOf = async (bytes: Uint8Array) => {
  const error: unknown = await openWorkbook(bytes).catch((thrown: unknown) => thrown);
  return error instanceof UnreadableWorkbook ? error.code : error;
};

/** A zip whose directory says that every part is of `size` bytes. */
function lying(zip: Uint8Array, size: number): Uint8Array {
  const bytes = Buffer.from(zip);
  for (let at = 0; at < bytes.length - 4; at += 1) {
    if (bytes.readUInt32LE(at) === 0x02014b50) bytes.writeUInt32LE(size, at + 24);
    if (bytes.readUInt32LE(at) === 0x04034b50) bytes.writeUInt32LE(size, at + 22);
  }
  return bytes;
}

const bomb = () =>
  zipSync({
    "xl/workbook.xml": strToU8("<workbook/>"),
    "xl/worksheets/sheet1.xml": new Uint8Array(unpackLimits.bytes + 1),
  });

describe("openWorkbook", () => {
  it("reads what was written", async () => {
    expect(await openWorkbook(await book())).toMatchObject([{ name: "One", rows: [["a"]] }]);
  });

  it.each([
    ["nothing", new Uint8Array()],
    ["text", strToU8("station,z\r\n")],
    ["a zip without a workbook", zipSync({ "word/document.xml": strToU8("<w/>") })],
    ["a zip cut short", zipSync({ "xl/workbook.xml": strToU8("<workbook/>") }).subarray(0, 60)],
    ["a workbook without parts", zipSync({ "xl/workbook.xml": strToU8("<workbook/>") })],
    ["a workbook that is no XML", zipSync({ "xl/workbook.xml": strToU8("PK") })],
  ])("refuses %s", async (_, bytes) => {
    expect(await codeOf(bytes)).toBe("file_not_as_stated");
  });

  it("refuses a bomb that states its size, before it unpacks anything", async () => {
    const packed = bomb();
    const startedMs = performance.now();
    expect(await codeOf(packed)).toBe("call_too_large");
    expect(performance.now() - startedMs).toBeLessThan(1_000);
  });

  it("refuses a bomb that lies about its size", async () => {
    expect(["call_too_large", "file_not_as_stated"]).toContain(await codeOf(lying(bomb(), 100)));
    expect(() => unpackWorkbook(lying(bomb(), 100))).toThrow(UnreadableWorkbook);
  });

  it("refuses more parts than a workbook has", async () => {
    const parts = Array.from({ length: unpackLimits.parts + 1 }, (_, index) => [
      `xl/${index}.xml`,
      strToU8("<a/>"),
    ]);
    expect(await codeOf(zipSync(Object.fromEntries(parts) as Record<string, Uint8Array>))).toBe(
      "call_too_large",
    );
  });

  it.each([
    ["a row", '<row r="99999999999"><c r="A99999999999"><v>1</v></c></row>'],
    ["a column", '<row r="2"><c r="XFD2"><v>1</v></c></row>'],
    ["a column beyond all", '<row r="2"><c r="ZZZZZZ2"><v>1</v></c></row>'],
  ])("refuses %s far out, which would be filled up to", async (_, row) => {
    const far = alterPart(await book(), "xl/worksheets/sheet1.xml", (xml) =>
      xml.replace("</sheetData>", `${row}</sheetData>`),
    );
    expect(await codeOf(far)).toBe("call_too_large");
  });

  it("refuses entities, and follows no link to another file", async () => {
    const declared = alterPart(await book(), "xl/workbook.xml", (xml) =>
      xml.replace("?>", '?><!DOCTYPE a [<!ENTITY b SYSTEM "file:///etc/hostname">]>'),
    );
    expect(await codeOf(declared)).toBe("file_not_as_stated");
    const linked = alterPart(await book(), "xl/_rels/workbook.xml.rels", (xml) =>
      xml.replace(
        "</Relationships>",
        '<Relationship Id="rIdX" Type="http://schemas.openxmlformats.org/officeDocument/2006/relationships/externalLink" Target="http://192.0.2.1/x.xlsx" TargetMode="External"/></Relationships>',
      ),
    );
    expect(await openWorkbook(linked)).toMatchObject([{ rows: [["a"]] }]);
  });
});
