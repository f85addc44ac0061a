import type { ReportFormat } from "../report-format.ts";
import { drawDimensions } from "./draw-dimensions.ts";
import { drawEndViews, drawKey } from "./draw-end-view.ts";
import { drawStrip } from "./draw-strip.ts";
import { drawTitleBlock } from "./draw-title-block.ts";
import { Drawing } from "./drawing.ts";
import { drawnMachine } from "./drawn-machine.ts";
import { scaleSheet } from "./sheet-scale.ts";

/** A drawing in millimetres: elevation, plan and end views, true along z, on named layers. */
export const dxfReport: ReportFormat = {
  extension: "dxf",
  mediaType: "image/vnd.dxf",
  write: (record, context) => {
    const machine = drawnMachine(record);
    const scale = scaleSheet(machine, record.machine.units.axial);
    const drawing = new Drawing(scale.letter);
    drawStrip(drawing, machine, scale, "v");
    drawStrip(drawing, machine, scale, "h");
    drawDimensions(drawing, machine, scale, record.machine.units.axial);
    drawEndViews(drawing, machine, scale);
    drawKey(drawing, machine, scale);
    drawTitleBlock(drawing, record, context, scale);
    return drawing.write();
  },
};
