import { strFromU8, strToU8, unzipSync, zipSync } from "fflate";

/** A workbook with one part of it changed. */
export function alterPart(workbook: Uint8Array, path: string, change: (xml: string) => string): Buffer {
  const parts = unzipSync(workbook);
  const part = parts[path];
  if (!part) throw new Error(`The workbook has no ${path}.`);
  return Buffer.from(zipSync({ ...parts, [path]: strToU8(change(strFromU8(part))) }));
}

/** The same with one cell of a sheet, by name and address, holding other XML; a cell that was empty is put in its row. */
export function alterCell(workbook: Uint8Array, sheet: string, address: string, content: string): Buffer {
  const names = [
    ...strFromU8(unzipSync(workbook)["xl/workbook.xml"] ?? new Uint8Array()).matchAll(
      /<sheet [^>]*name="([^"]*)"/g,
    ),
  ];
  const index = names.findIndex(([, name]) => name === sheet);
  const row = /\d+$/.exec(address)?.[0] ?? "";
  const cell = (inside: string) => {
    const type = inside.startsWith("<is>") ? ' t="inlineStr"' : "";
    return `<c r="${address}"${type}>${inside}</c>`;
  };
  return alterPart(workbook, `xl/worksheets/sheet${index + 1}.xml`, (xml) => {
    const standing = new RegExp(`<c r="${address}"(?: [^>]*)?(?:/>|>.*?</c>)`);
    if (standing.test(xml)) return xml.replace(standing, () => (content === "" ? "" : cell(content)));
    return xml.replace(new RegExp(`(<row r="${row}"[^>]*>)(.*?)</row>`), (_, open: string, cells: string) => {
      const all = [...cells.matchAll(/<c r="([A-Z]+)\d+".*?(?:\/>|<\/c>)/g)].map(
        ([whole, letters = ""]): [string, string] => [letters, whole],
      );
      all.push([address.replace(row, ""), cell(content)]);
      all.sort(([a], [b]) => a.length - b.length || (a < b ? -1 : 1));
      return `${open}${all.map(([, whole]) => whole).join("")}</row>`;
    });
  });
}

export const textInside = (text: string): string =>
  `<is><t xml:space="preserve">${text.replaceAll("&", "&amp;").replaceAll("<", "&lt;")}</t></is>`;
