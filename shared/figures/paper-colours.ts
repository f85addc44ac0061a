import type { Fill } from "./shape.ts";

/** The console's light theme, for what is drawn outside a browser. */
export const paperColours: Readonly<Record<Fill, string>> = {
  ink: "#23262a",
  muted: "#5d5a53",
  faint: "#d3ccbd",
  signal: "#b5341a",
  paper: "#faf7ef",
  /** Muted, 14 parts of 100 over the sheet. */
  shade: "#e4e1d9",
};

/** The same on white paper. */
export const whitePaperColours: typeof paperColours = { ...paperColours, paper: "#ffffff", shade: "#e8e8e7" };
