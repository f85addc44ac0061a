export interface GuidePage {
  /** Its place in the address, under /guide. */
  readonly slug: string;
  readonly title: string;
  /** What it explains, in one sentence. */
  readonly lead: string;
}

/** The guide's pages, in the order in which a job needs them. */
export const guidePages = [
  {
    slug: "conventions",
    title: "Conventions",
    lead: "Which way is positive, from which end a bore is seen, and which units a number is in.",
  },
  {
    slug: "jobs",
    title: "Jobs",
    lead: "What a job is made of, the order of its work, why its signature is refused, and one followed in numbers.",
  },
  {
    slug: "worked-example",
    title: "Worked example",
    lead: "One call followed by hand, from gauge readings to shims.",
  },
  {
    slug: "cold-targets",
    title: "Cold targets",
    lead: "Where each bore should lie cold, so that it lies right when the machine runs.",
  },
  {
    slug: "measurement-plans",
    title: "Measurement plans",
    lead: "How certain readings make a centre before they are taken, and where to read more.",
  },
  {
    slug: "line-of-sight",
    title: "Line of sight",
    lead: "How to shift and tilt the source so that its beam runs through the bores, and what bends it.",
  },
  {
    slug: "bore-fits",
    title: "Bore fits",
    lead: "From readings of a wall to a centre, a size and how well both are known.",
  },
  {
    slug: "axis-and-verdicts",
    title: "Axis and verdicts",
    lead: "The reference axis, how far each bore lies off it, and whether that is inside its tolerance.",
  },
  {
    slug: "moves",
    title: "Moves and shims",
    lead: "The move of each rigid part, the shims that make it, and the steps in order.",
  },
  {
    slug: "confirmations",
    title: "Confirmations",
    lead: "Whether the moves did what they should, and nothing else moved.",
  },
  {
    slug: "repeatability",
    title: "Repeatability",
    lead: "How well readings repeat: one person at one station, and people against each other.",
  },
  {
    slug: "codes",
    title: "Problem codes",
    lead: "Every code the service can answer with, and what to do about it.",
  },
] as const satisfies readonly GuidePage[];

export type GuideSlug = (typeof guidePages)[number]["slug"];
