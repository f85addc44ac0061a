import { commonPractice, ownRule, type Method } from "../method.ts";

/** How a line of sight is brought through the bores, and what it suffers on the way. */
export const sightMethods: readonly Method[] = [
  {
    id: "shift-and-tilt",
    title: "Shift and tilt of the source",
    asked: "sourceZ, stations, sense, adjuster",
    says: [
      "From the beam's spot at a near and a far bore, each on a target at the bore's centre: the source moves as one rigid piece, along the straight line that takes away what the beam is off at both. Its value at the source is the shift, its slope the tilt, its values at two supports what each of them moves.",
      "Read, move and read again until `next` is `go_on`. Every h of the call is in the view of `seen`; the answer is in the downstream view. Stand the source outside the stations measured: between them the answer warns `source_inside_stations`.",
    ],
    formulas: ["m(z) = −d_1 + (z − z_1) · (d_1 − d_2)/(z_2 − z_1)", "shift = m(z_s)"],
    where: [
      ["d_1, d_2", "beam − expected at the two stations"],
      ["z_s", "of the source"],
    ],
    sources: [ownRule],
  },
  {
    id: "beam-within",
    title: "Within the distance wanted",
    asked: "wanted, readingUncertainty, level",
    says: [
      "The distance and what is uncertain of it must be inside together, so that a beam told as within is so at the level. Where no uncertainty is stated the distance alone is judged.",
      "Stations close together for how far the source is make the shift at the source uncertain: the factor is answered, and above 5 warns `stations_close_together`.",
    ],
    formulas: ["|d| + k_2 · u ≤ wanted", "factor = √(a² + (1 − a)²),   a = (z_2 − z_s)/(z_2 − z_1)"],
    where: [
      ["k_2", "two-dimensional coverage factor, 2.448 at 0.95"],
      ["u", "standard uncertainty of each coordinate of a spot"],
    ],
    sources: ["JCGM 106:2012", commonPractice],
  },
  {
    id: "sight-drift",
    title: "Drift while it is read",
    asked: "drift: {closing, allowed, shareOut}",
    says: [
      "The first station is read again at the end. Within the allowed distance the drift is accepted, or shared out evenly over the readings in their order, all put back to the moment of the first. Beyond it the survey is refused: no move is answered.",
    ],
    formulas: ["drift = closing − opening", "second station: beam − drift/2"],
    where: [],
    sources: [commonPractice],
  },
  {
    id: "sight-bend",
    title: "Bend in uneven air",
    asked: "sightPath: {gradient, length}",
    says: [
      "A beam curves away from the warm side. 1 °C per metre across 10 m bends it by 0.047 mm. The spots hold that already; it enters the uncertainty of what is measured off this line, and above that of a spot warns `bend_exceeds_uncertainty`. It is an estimate: the gradient is seldom the same all along.",
    ],
    formulas: ["bend = ½ · L² · N · G"],
    where: [
      ["L", "how far the gradient reaches from the source"],
      ["N", "change of the refractive index of air, −0.93 · 10^{−6} per °C"],
      ["G", "rise of temperature across the beam, per length"],
    ],
    sources: ["K. P. Birch, M. J. Downs, Metrologia 31 (1994) 315"],
  },
];
