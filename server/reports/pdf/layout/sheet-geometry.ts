/** An A3 sheet across, in millimetres, framed as ISO 5457 asks: a filing margin at the left, the frame 10 mm inside elsewhere. */
export const sheetSize = { width: 420, height: 297 } as const;
export const frame = { left: 20, top: 10, right: 410, bottom: 287 } as const;

/** ISO 7200: the title block is 180 mm wide, at the lower right. */
export const titleBlock = { left: 230, top: 251, right: 410, bottom: 287 } as const;
/** Beside it, what the sheet was made from. */
export const recordBlock = { left: 20, top: 251, right: 230, bottom: 287 } as const;

/** Where the heading of a sheet stands: its baseline. */
export const heading = { x: 26, baseline: 20.5 } as const;
/** What is left for content. */
export const area = { left: 26, top: 28, right: 404, bottom: 247 } as const;
export const areaWidth = area.right - area.left;
export const areaHeight = area.bottom - area.top;
export const columnGap = 10;

/** Lettering of ISO 3098, heights of capitals in millimetres. */
export const letterHeights = { sheet: 3.5, text: 2.5, small: 1.8 } as const;
