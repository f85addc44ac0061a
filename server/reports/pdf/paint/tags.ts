import type { LaidTable } from "../layout/lay-out-table.ts";

type Element = PDFKit.PDFStructureElement;

/** What pdfkit takes beyond what its types know: a figure's box in points, and what a heading cell is the head of. */
type ElementOptions = PDFKit.Mixins.StructureElementOptions & {
  readonly bbox?: readonly [left: number, top: number, right: number, bottom: number];
  readonly scope?: "Column" | "Row";
};

/**
 * The structure of the document as it is drawn (ISO 32000-1, 14.8): parts, headings, paragraphs, lists, tables, figures,
 * and what is for the eye alone.
 */
export class Tags {
  private readonly root: Element;
  private part: Element | null = null;
  private list: Element | null = null;
  private tables = new Map<LaidTable, Element>();

  constructor(private readonly document: PDFKit.PDFDocument) {
    this.root = document.struct("Document");
    document.addStructure(this.root);
  }

  /** Begins a part of the report; what follows belongs to it, over as many sheets as it takes. */
  beginPart(title: string): void {
    this.endPart();
    this.part = this.document.struct("Sect", { title });
    this.root.add(this.part);
  }

  endPart(): void {
    this.part?.end();
    this.part = null;
    this.list = null;
    this.tables = new Map();
  }

  content(type: string, draw: () => void, options: ElementOptions = {}): void {
    this.list = null;
    const element = this.document.struct(type, options);
    this.current.add(element);
    element.add(draw);
    element.end();
  }

  /** An item of the list that is open, or of a new one. */
  listItem(mark: () => void, body: () => void): void {
    if (!this.list) {
      this.list = this.document.struct("L");
      this.current.add(this.list);
    }
    const item = this.document.struct("LI");
    this.list.add(item);
    for (const [type, draw] of [
      ["Lbl", mark],
      ["LBody", body],
    ] as const) {
      const element = this.document.struct(type);
      item.add(element);
      element.add(draw);
      element.end();
    }
    item.end();
  }

  /** The element of a table: the same one wherever it goes on. */
  table(table: LaidTable): Element {
    this.list = null;
    const known = this.tables.get(table);
    if (known) return known;
    const element = this.document.struct("Table", { title: table.caption });
    this.current.add(element);
    this.tables.set(table, element);
    return element;
  }

  row(table: Element): Element {
    const row = this.document.struct("TR");
    table.add(row);
    return row;
  }

  cell(row: Element, type: "TH" | "TD", scope: "Column" | "Row" | null, draw: () => void): void {
    const options: ElementOptions = scope === null ? {} : { scope };
    const cell = this.document.struct(type, options);
    row.add(cell);
    cell.add(draw);
    cell.end();
  }

  artifact(draw: () => void, type: "Pagination" | "Layout" = "Layout"): void {
    this.document.markContent("Artifact", { type });
    draw();
    this.document.endMarkedContent();
  }

  private get current(): Element {
    if (!this.part) throw new Error("Nothing is drawn before a part has begun.");
    return this.part;
  }
}
