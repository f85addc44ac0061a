import type { CalculationKind } from "../../../config/paths.ts";
import type { GuideSlug } from "../guide-pages.ts";

interface JobStep {
  readonly does: string;
  /** Which calculation serves it; null where hands do. */
  readonly kind: CalculationKind | null;
  /** The page of the guide that explains it. */
  readonly slug: GuideSlug;
}

/** The whole job, as a field crew goes through it. */
export const jobSteps: readonly JobStep[] = [
  {
    does: "Work out where each bore should lie cold.",
    kind: "cold-target",
    slug: "cold-targets",
  },
  {
    does: "Plan how many readings each bore needs, and where.",
    kind: "measurement-plan",
    slug: "measurement-plans",
  },
  {
    does: "Bring the line of sight roughly onto the bore line, its source outside the stations measured.",
    kind: "sight-line-setup",
    slug: "line-of-sight",
  },
  {
    does: "Prove that readings repeat before trusting them.",
    kind: "repeatability-study",
    slug: "repeatability",
  },
  { does: "Measure as found, and fit every bore's centre.", kind: "bore-fit", slug: "bore-fits" },
  {
    does: "Set the reference axis, and judge every deviation.",
    kind: "axis-deviation",
    slug: "axis-and-verdicts",
  },
  {
    does: "Where moving parts is dear, choose the axis and the fewest parts to move together.",
    kind: "fewest-moves",
    slug: "moves",
  },
  { does: "Plan the moves, the shims and their order.", kind: "shim-move", slug: "moves" },
  {
    does: "Or all three from readings to shims in one call, kept as one record.",
    kind: "alignment",
    slug: "worked-example",
  },
  {
    does: "Move in small steps, each locked before the next, watching the neighbours.",
    kind: null,
    slug: "jobs",
  },
  {
    does: "Measure again, the reference stations first, and confirm what moved.",
    kind: "confirmation",
    slug: "confirmations",
  },
  { does: "Settle what is open, sign by name, and hand over the report.", kind: null, slug: "jobs" },
];
