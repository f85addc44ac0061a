import type { Section } from "./blocks.ts";
import type { LaidSheet, Placed } from "./placed.ts";
import { area, areaHeight, areaWidth, columnGap } from "./sheet-geometry.ts";

interface Announced {
  readonly before: number;
  readonly height: number;
  readonly place: (x: number, y: number) => Placed;
}

/** Fills the columns of a section's sheets from the top left, opening a sheet whenever the last one is full. */
export class SheetFlow {
  readonly width: number;
  readonly height = areaHeight;
  private readonly sheets: Placed[][] = [[]];
  private column = 0;
  private y: number = area.top;
  private announced: Announced | null = null;

  constructor(private readonly section: Section) {
    const { columns } = section;
    this.width = (areaWidth - (columns - 1) * columnGap) / columns;
  }

  get left(): number {
    return area.bottom - this.y;
  }

  get isAtTop(): boolean {
    return this.y === area.top;
  }

  /** A heading: placed with what comes after it, so that it never ends a column. */
  announce(heading: Announced): void {
    this.keep(0);
    this.announced = heading;
  }

  /**
   * Makes room for `height` millimetres of what belongs together: in the next column where fewer are left in this one.
   * To be called before anything is put.
   */
  keep(height: number): void {
    const { announced } = this;
    const lead = announced ? announced.before + announced.height : 0;
    if (!this.isAtTop && lead + height > this.left + 1e-6) this.next();
    if (!announced) return;
    this.announced = null;
    this.skip(announced.before);
    this.put(announced.height, announced.place);
  }

  put(height: number, place: (x: number, y: number) => Placed): void {
    this.sheets.at(-1)?.push(place(this.x, this.y));
    this.y += height;
  }

  skip(height: number): void {
    if (!this.isAtTop) this.y += height;
  }

  next(): void {
    this.column = (this.column + 1) % this.section.columns;
    if (this.column === 0) this.sheets.push([]);
    this.y = area.top;
  }

  end(): LaidSheet[] {
    this.keep(0);
    return this.sheets
      .filter((items, index) => index === 0 || items.length > 0)
      .map((items, index) => ({ section: this.section.title, first: index === 0, items }));
  }

  private get x(): number {
    return area.left + this.column * (this.width + columnGap);
  }
}
