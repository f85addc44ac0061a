import type { ComponentType } from "react";
import type { GuideSlug } from "./guide-pages.ts";

const methodPages = () => import("./components/method-pages.tsx");

/** Loads what stands on a page of the guide when it is first opened. */
export const loadPage: Readonly<Record<GuideSlug, () => Promise<ComponentType>>> = {
  conventions: async () => (await import("./components/conventions.tsx")).Conventions,
  jobs: async () => (await import("./components/jobs.tsx")).Jobs,
  "worked-example": async () => (await import("./components/worked-example.tsx")).WorkedExample,
  "cold-targets": async () => (await methodPages()).ColdTargets,
  "measurement-plans": async () => (await methodPages()).MeasurementPlans,
  "line-of-sight": async () => (await methodPages()).LineOfSight,
  "bore-fits": async () => (await import("./components/bore-fits.tsx")).BoreFits,
  "axis-and-verdicts": async () => (await import("./components/axis-and-verdicts.tsx")).AxisAndVerdicts,
  moves: async () => (await import("./components/moves.tsx")).Moves,
  confirmations: async () => (await methodPages()).Confirmations,
  repeatability: async () => (await methodPages()).Repeatability,
  codes: async () => (await import("./components/codes.tsx")).Codes,
};
