/** The forms that a report comes in, as the service's addresses name them; tests hold it to the service's own list. */
export const reportFormats = [
  { extension: "pdf", words: "PDF, for signing and filing" },
  { extension: "xlsx", words: "Workbook (XLSX)" },
  { extension: "dxf", words: "Drawing (DXF)" },
  { extension: "csv", words: "Table (CSV)" },
  { extension: "json", words: "Record (JSON)" },
] as const;
