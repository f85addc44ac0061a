import canonicalize from "canonicalize";
import { describe, expect, it } from "vitest";
import { alterCell, alterPart, textInside } from "../../../tests/support/altered-workbook.ts";
import { hostileJob } from "../../../tests/support/hostile-job.ts";
import { saveBySpreadsheetProgram } from "../../../tests/support/spreadsheet-program.ts";
import { machineDocument, type MachineDocument } from "../../../shared/schemas/machines.ts";
import { fellgateDocument } from "../../demo/fellgate-document.ts";
import { machineFaults } from "../machine-faults.ts";
import { openWorkbook } from "../../spreadsheets/open-workbook.ts";
import { readMachineWorkbook } from "./read-machine-workbook.ts";
import { writeMachineTemplate, writeMachineWorkbook } from "./write-machine-workbook.ts";

const about = { description: "Machine", createdAt: new Date("2026-12-01T00:00:00Z") };
const write = (document: MachineDocument) => writeMachineWorkbook(document, about);
const faultsOf = async (bytes: Uint8Array) => (await readMachineWorkbook(bytes)).faults;

const stack = { thickness: 5, min: 0, max: null, maxCount: 4, shims: [0.05, 0.1 + 0.2, 4.65] };
/** Every member that a machine can have, and every way to state nothing. */
const fullDocument = machineDocument.parse({
  name: "Full",
  plantTag: null,
  owner: "none",
  downstream: "aft",
  units: { axial: "in", bore: "in", offset: "mil" },
  stations: [
    { id: "1", label: "12", kind: "bearing", z: -0.1, nominalDiameter: null, target: null, tolerance: null },
    {
      id: "a;b",
      kind: "seal",
      z: 1e9,
      target: { h: 0, v: -1e-7 },
      targetUncertainty: { h: 0, v: 0.1 },
      tolerance: { radial: 3 },
    },
    { id: " c ", kind: "other", z: 1 / 3, tolerance: { h: [-1, 2], v: 4 }, targetUncertainty: null },
  ],
  reference: ["a;b"],
  components: [
    {
      id: "casing",
      kind: "casing",
      stations: ["1", " c "],
      fixed: false,
      allowReferenceMove: true,
      carriedBy: null,
      tilt: { tolerance: { h: 0.001, v: 0.002 } },
      roll: {
        radians: 0,
        feet: [
          { support: "feet", place: "left", h: -9, v: 0 },
          { support: "feet", place: "right", h: 9, v: 0 },
        ],
      },
      supports: [
        {
          id: "feet",
          z: 0,
          form: "feet",
          blocked: [],
          travel: {},
          keys: "inside",
          stacks: { left: stack, right: stack },
        },
        { id: "keys", z: 5, form: "joint_keys", blocked: ["h"], travel: { v: [-1, 1] }, stacks: {} },
      ],
    },
    {
      id: "bearing",
      carriedBy: "casing",
      stations: ["a;b"],
      tilt: null,
      roll: null,
      supports: [
        {
          id: "seat",
          z: 2,
          form: "pads",
          pads: [
            { id: "p", clockDeg: 135, stack: { thickness: 0, shims: [] } },
            { id: "q", clockDeg: 225, stack: { thickness: 1, shims: null } },
          ],
        },
      ],
    },
    { id: "frame", fixed: true, stations: [], supports: [] },
  ],
  couplings: [],
  indicators: [{ id: "di", component: "casing", z: 1, clockDeg: 0 }],
  shims: {
    stock: [
      { thickness: 0.05, quantity: null },
      { thickness: 1, quantity: 0 },
    ],
    cutToSize: null,
    reuse: false,
  },
  maximumIncrement: null,
  maximumMisfit: 1,
  cautions: ["-Mind\r\nthe gap_x0041_"],
  remarks: "",
});

describe("a machine as a workbook", () => {
  it("has documents to show it on that the service would store", () => {
    for (const document of [fellgateDocument, fullDocument, hostileJob().machine])
      expect(machineFaults(machineDocument.parse(document))).toEqual([]);
  });

  it.each([
    ["the demo's", fellgateDocument],
    ["with every member and every way to state nothing", fullDocument],
    ["with names that are traps", hostileJob().machine],
    ["with empty shims", { ...fellgateDocument, shims: { stock: [] }, components: [], indicators: [] }],
    ["with shims of null", { ...fellgateDocument, shims: null, cautions: [], remarks: null }],
  ])("is read back to the same document, %s", async (_, document) => {
    const { document: read, faults } = await readMachineWorkbook(await write(document));
    expect(faults).toEqual([]);
    expect(canonicalize(read)).toBe(canonicalize(machineDocument.parse(document)));
  });

  it("is the same after somebody saved it in LibreOffice", async () => {
    const saved = await saveBySpreadsheetProgram(await write(fellgateDocument));
    const { document, faults } = await readMachineWorkbook(saved);
    expect(faults).toEqual([]);
    expect(canonicalize(document)).toBe(canonicalize(fellgateDocument));
  }, 60_000);

  it("is the same bytes for the same document", async () => {
    expect((await write(fullDocument)).equals(await write(fullDocument))).toBe(true);
  });
});

describe("the template", () => {
  it("names its units in the headings, and says what is missing of an empty one", async () => {
    const template = await writeMachineTemplate({ axial: "in", bore: "in", offset: "mil" });
    const faults = await faultsOf(template);
    expect(faults.map(({ sheet, cell, code }) => [sheet, cell, code])).toEqual([
      ["Machine", "B2", "required"],
      ["Machine", "B5", "required"],
      ["Stations", null, "required"],
    ]);
  });

  it("guides with the range that each number may have", async () => {
    const sheets = await openWorkbook(await writeMachineTemplate({ axial: "mm", bore: "mm", offset: "mm" }));
    const guide = sheets.find(({ name }) => name === "Guide")?.rows ?? [];
    const z = guide.find(([heading]) => heading === "z (mm)");
    expect(z?.[1]).toBe(
      "Required. From one common face, increasing downstream. From -10000000000 to 10000000000.",
    );
    expect(guide.find(([heading]) => heading === "Thickness (mm)")?.[1]).toMatch(/ From 0 to 1000000\.$/);
  });

  it("filled in by hand makes a machine", async () => {
    let book = await writeMachineTemplate({ axial: "mm", bore: "mm", offset: "mm" });
    book = alterCell(book, "Machine", "B2", textInside("By hand"));
    book = alterCell(book, "Machine", "B5", textInside("aft"));
    const row = `<row r="2"><c r="A2"><v>7</v></c><c r="C2" t="inlineStr">${textInside("bearing")}</c><c r="D2"><v>12.5</v></c></row>`;
    book = alterPart(book, "xl/worksheets/sheet2.xml", (xml) =>
      xml.replace("</sheetData>", `${row}</sheetData>`),
    );
    const { document, faults } = await readMachineWorkbook(book);
    expect(faults).toEqual([]);
    expect(document?.stations).toEqual([{ id: "7", kind: "bearing", z: 12.5 }]);
  });
});

describe("a workbook with faults", () => {
  const faultAfter = async (sheet: string, cell: string, content: string) =>
    faultsOf(alterCell(await write(fellgateDocument), sheet, cell, content));

  it.each([
    ["a decimal comma", "Stations", "D3", textInside("620,5"), "wrong_type", /decimal comma/],
    ["a number as text", "Stations", "D3", textInside("620"), "wrong_type", /not a number/],
    ["a formula", "Stations", "D3", "<f>D2+620</f><v>620</v>", "wrong_type", /formula/],
    ["a formula in a text column", "Machine", "B2", "<f>1+1</f><v>2</v>", "wrong_type", /formula/],
    ["an empty cell that is needed", "Stations", "D3", "", "required", /missing/],
    ["an unknown kind", "Stations", "C3", textInside("turbine"), "choice_unknown", /./],
    ["an id that stands twice", "Stations", "A3", textInside("brg-1"), "duplicate_id", /./],
    ["two tolerances at once", "Stations", "L2", "<v>0.1</v>", "combination_invalid", /together/],
    ["a tolerance of nothing", "Stations", "J3", "<v>-1</v>", "out_of_range", /./],
    [
      "a component that is not there",
      "Stacks",
      "A2",
      textInside("nobody"),
      "unknown_reference",
      /Components/,
    ],
    ["a support that is not there", "Stacks", "B2", textInside("nowhere"), "unknown_reference", /Supports/],
    ["a place that feet have not", "Stacks", "C2", textInside("top"), "unknown_field", /./],
    ["a place that no object may have", "Stacks", "C2", textInside("__proto__"), "unknown_field", /./],
    ["pieces with decimal commas", "Stacks", "I2", textInside("0,05; 1"), "wrong_type", /decimal point/],
    ["a heading in another unit", "Stations", "D1", textInside("z (in)"), "combination_invalid", /says in/],
    ["a heading without its unit", "Stations", "D1", textInside("z"), "units_missing", /z \(mm\)/],
    ["a heading that nobody knows", "Stations", "B1", textInside("Colour"), "unknown_field", /Colour/],
    ["a heading that stands twice", "Stations", "B1", textInside("ID"), "duplicate_id", /twice/],
    ["a unit that nobody knows", "Machine", "B6", textInside("furlong"), "choice_unknown", /./],
    ["a field that nobody knows", "Machine", "A3", textInside("Tag"), "unknown_field", /Tag/],
    ["neither yes nor no", "Components", "D2", textInside("maybe"), "choice_unknown", /yes nor no/],
    ["a reference that is no station", "Machine", "B10", textInside("brg-9"), "unknown_reference", /./],
  ] as const)("names the sheet and the cell of %s", async (_, sheet, cell, content, code, words) => {
    const faults = await faultAfter(sheet, cell, content);
    const found = faults.find((fault) => fault.sheet === sheet && fault.cell === cell);
    expect(found?.code).toBe(code);
    expect(found?.detail).toMatch(words);
  });

  it("names the cell of an error of the spreadsheet, also where the cell may be empty", async () => {
    const book = alterPart(await write(fellgateDocument), "xl/worksheets/sheet2.xml", (xml) =>
      xml.replace(/<c r="E3"[^>]*>.*?<\/c>/, '<c r="E3" t="e"><v>#REF!</v></c>'),
    );
    expect(await faultsOf(book)).toMatchObject([{ sheet: "Stations", cell: "E3", code: "wrong_type" }]);
  });

  it("lists all of them, each cell once", async () => {
    const once = alterCell(await write(fellgateDocument), "Stations", "D3", textInside("1,5"));
    const twice = alterCell(once, "Stations", "C4", textInside("turbine"));
    const faults = await faultsOf(twice);
    expect(faults.map(({ cell, code }) => [cell, code])).toEqual([
      ["D3", "wrong_type"],
      ["C4", "choice_unknown"],
    ]);
  });

  it("names sheets that are not read, and one that is missing", async () => {
    const book = await write(fellgateDocument);
    const renamed = (from: string, to: string) =>
      alterPart(book, "xl/workbook.xml", (xml) => xml.replace(`name="${from}"`, `name="${to}"`));
    expect(await faultsOf(renamed("Cautions", "Warnings"))).toMatchObject([
      { sheet: "Warnings", cell: null, code: "unknown_field" },
    ]);
    expect(await faultsOf(renamed("Machine", "Turbine"))).toMatchObject([
      { sheet: "Turbine", code: "unknown_field" },
      { sheet: "Machine", code: "required" },
    ]);
  });

  it("takes an empty cell as missing and never as 0", async () => {
    const { document } = await readMachineWorkbook(
      alterCell(await write(fellgateDocument), "Stations", "E2", ""),
    );
    expect(document?.stations[0]).not.toHaveProperty("nominalDiameter");
  });
});
