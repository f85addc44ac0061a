import { strFromU8, strToU8, unzipSync, zipSync, type Zippable } from "fflate";
import { addressOf } from "./cell.ts";
import type { Sheet, Workbook } from "./sheet.ts";
import { cellText, xmlText } from "./xml-text.ts";

/** The date of every part: the first that a zip can state, in whatever zone the machine's clock is. */
const partDate = new Date(1980, 0, 1, 12);

const contentTypes = "[Content_Types].xml";
const packageParts = "_rels/.rels";
const office = "application/vnd.openxmlformats-";
const relations = "http://schemas.openxmlformats.org/";

/**
 * What the writer leaves out: values of formulas, names, print set-up, properties of the document. Then the parts are
 * zipped again under a fixed date, so that the same workbook is the same bytes.
 */
export function finishPackage(written: Uint8Array, workbook: Workbook): Buffer {
  const parts = Object.fromEntries(
    Object.entries(unzipSync(written)).map(([path, bytes]) => [path, strFromU8(bytes)]),
  );
  const change = (path: string, work: (xml: string) => string): void => {
    const xml = parts[path];
    if (xml === undefined) throw new Error(`The workbook has no part ${path}.`);
    parts[path] = work(xml);
  };
  workbook.sheets.forEach((sheet, index) =>
    change(`xl/worksheets/sheet${index + 1}.xml`, (xml) => finishSheet(xml, sheet, workbook)),
  );
  change("xl/workbook.xml", (xml) => replaceOnce(xml, "<definedNames/>", definedNames(workbook.sheets)));
  change(contentTypes, (xml) => replaceOnce(xml, "</Types>", `${propertyTypes}</Types>`));
  change(packageParts, (xml) => replaceOnce(xml, "</Relationships>", `${propertyRelations}</Relationships>`));
  parts["docProps/core.xml"] = coreProperties(workbook);
  parts["docProps/app.xml"] = applicationProperties;
  return Buffer.from(zipSync(ordered(parts), { level: 6, mtime: partDate }));
}

/** The list of parts comes first: readers that do not seek want it there. */
function ordered(parts: Readonly<Record<string, string>>): Zippable {
  const paths = Object.keys(parts).sort((a, b) =>
    a === contentTypes ? -1 : b === contentTypes ? 1 : a < b ? -1 : 1,
  );
  return Object.fromEntries(paths.map((path) => [path, strToU8(parts[path] ?? "")]));
}

function finishSheet(xml: string, sheet: Sheet, workbook: Workbook): string {
  const opening = /<worksheet [^>]*>/.exec(xml)?.[0] ?? "<worksheet>";
  const withFit = xml.replace(opening, () => `${opening}<sheetPr><pageSetUpPr fitToPage="1"/></sheetPr>`);
  const withSetUp = withFit.replace(
    /<pageMargins [^>]*\/><pageSetup [^>]*\/>/,
    () =>
      '<pageMargins left="0.5" right="0.5" top="0.75" bottom="0.75" header="0.3" footer="0.3"/>' +
      `<pageSetup paperSize="${paperCodes[sheet.paper ?? "A4"]}" orientation="landscape" fitToWidth="1" fitToHeight="0"/>` +
      headerFooter(workbook),
  );
  if (!withSetUp.includes("<headerFooter>")) throw new Error(`${sheet.name} has no page set-up.`);
  return withValues(withSetUp, sheet);
}

/** Each formula with what it comes to, so that readers that do not compute show it. */
function withValues(xml: string, { rows, name }: Sheet): string {
  const values = new Map(
    rows.flatMap((row, at) =>
      row.flatMap((cell, column) =>
        cell?.kind === "formula" ? [[addressOf(at, column), cell.value] as const] : [],
      ),
    ),
  );
  let left = values.size;
  const done = xml.replaceAll(
    /<c r="([A-Z]+\d+)"([^>]*)><f>([^<]*)<\/f><\/c>/g,
    (_whole, address: string, attributes: string, formula: string) => {
      const value = values.get(address);
      if (value === undefined) throw new Error(`${name}!${address} holds a formula that nobody wrote.`);
      left -= 1;
      return typeof value === "number"
        ? `<c r="${address}"${attributes}><f>${formula}</f><v>${value}</v></c>`
        : `<c r="${address}"${attributes} t="str"><f>${formula}</f><v>${xmlText(cellText(value))}</v></c>`;
    },
  );
  if (left !== 0) throw new Error(`${left} formulas of ${name} are without a value.`);
  return done;
}

/** Names of cells, and the heading rows that are printed on every page. */
function definedNames(sheets: readonly Sheet[]): string {
  const names = sheets.flatMap((sheet, index) => {
    const place = `'${sheet.name}'!`;
    const own = Object.entries(sheet.names ?? {}).map(
      ([name, address]) =>
        [name, `${place}${address.replace(/^([A-Z]+)(\d+)$/, "$$$1$$$2")}`, index] as const,
    );
    const row = (sheet.headingRow ?? -1) + 1;
    return row > 0 ? [["_xlnm.Print_Titles", `${place}$${row}:$${row}`, index] as const, ...own] : own;
  });
  if (names.length === 0) return "";
  const written = names
    .toSorted(([a, , i], [b, , j]) => (a === b ? i - j : a < b ? -1 : 1))
    .map(
      ([name, refersTo, index]) =>
        `<definedName name="${name}" localSheetId="${index}">${xmlText(refersTo)}</definedName>`,
    );
  return `<definedNames>${written.join("")}</definedNames>`;
}

/** ECMA-376 part 1, 18.3.1.63. */
const paperCodes = { A3: 8, A4: 9 } as const;

/** A header holds 255 signs at most; & begins a code in it unless doubled. */
function headerFooter({ pageHead, pageFoot }: Workbook): string {
  const plain = (text: string, most: number) =>
    [...text.replaceAll(/\s+/g, " ")].slice(0, most).join("").replaceAll("&", "&&");
  const head = `&L${plain(pageHead.left, 60)}&R${plain(pageHead.right, 50)}`;
  const foot = `&L${pageFoot.map((line) => plain(line, 90)).join("\n")}&RPage &P of &N`;
  return `<headerFooter><oddHeader>${xmlText(head)}</oddHeader><oddFooter>${xmlText(foot)}</oddFooter></headerFooter>`;
}

const propertyTypes =
  `<Override ContentType="${office}package.core-properties+xml" PartName="/docProps/core.xml"/>` +
  `<Override ContentType="${office}officedocument.extended-properties+xml" PartName="/docProps/app.xml"/>`;
const propertyRelations =
  `<Relationship Id="rId-core" Type="${relations}package/2006/relationships/metadata/core-properties" Target="docProps/core.xml"/>` +
  `<Relationship Id="rId-app" Type="${relations}officeDocument/2006/relationships/extended-properties" Target="docProps/app.xml"/>`;

const declaration = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>';

function coreProperties({ title, creator, description, createdAt }: Workbook): string {
  const at = createdAt.toISOString().replace(/\.\d+Z$/, "Z");
  const moment = (name: string) => `<dcterms:${name} xsi:type="dcterms:W3CDTF">${at}</dcterms:${name}>`;
  return (
    `${declaration}<cp:coreProperties xmlns:cp="${relations}package/2006/metadata/core-properties" ` +
    'xmlns:dc="http://purl.org/dc/elements/1.1/" xmlns:dcterms="http://purl.org/dc/terms/" ' +
    'xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance">' +
    `<dc:title>${xmlText(title)}</dc:title><dc:creator>${xmlText(creator)}</dc:creator>` +
    `<dc:description>${xmlText(description)}</dc:description>${moment("created")}${moment("modified")}` +
    "</cp:coreProperties>"
  );
}

const applicationProperties =
  `${declaration}<Properties xmlns="${relations}officeDocument/2006/extended-properties">` +
  "<Application>Borewright</Application></Properties>";

function replaceOnce(text: string, part: string, by: string): string {
  if (!text.includes(part)) throw new Error(`The workbook has no ${part}.`);
  return text.replace(part, () => by);
}
