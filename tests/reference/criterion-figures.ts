/** A limiting circle as both doors of the engine answer it. */
export interface CriterionFigures {
  readonly h: number;
  readonly v: number;
  readonly diameter: number;
  readonly roundness: number;
}

type Method = "least_squares" | "minimum_zone" | "minimum_circumscribed" | "maximum_inscribed";

/** The circles of all criteria in the words of the reference cases. */
export function figuresOfCriteria(fit: (method: Method) => CriterionFigures) {
  const zone = fit("minimum_zone");
  const single = (method: Method) => {
    const { h, v, diameter } = fit(method);
    return { center: [h, v], radius: diameter / 2 };
  };
  return {
    minimum_zone: {
      center: [zone.h, zone.v],
      r_outer: (zone.diameter + zone.roundness) / 2,
      r_inner: (zone.diameter - zone.roundness) / 2,
      width: zone.roundness,
    },
    minimum_circumscribed: single("minimum_circumscribed"),
    maximum_inscribed: single("maximum_inscribed"),
    least_squares: single("least_squares"),
  };
}
