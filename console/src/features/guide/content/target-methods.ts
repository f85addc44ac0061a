import { ownRule, type Method } from "../method.ts";

/** Where a bore should lie cold. */
export const targetMethods: readonly Method[] = [
  {
    id: "target",
    title: "Target",
    asked: "stations: {follows: rotor | bearing_line}",
    says: [
      "A part round the rotor (casing, shroud, nozzle, seal) follows the running shaft. A bearing follows the line wanted for it hot; the journal runs off its centre, so the rotor is not used there. The contributions are kept apart in the answer.",
      "The standard uncertainties of the growths are combined as independent.",
    ],
    formulas: ["rotor: target = rotor − growth − closing", "bearing_line: target = line − growth − closing"],
    where: [
      ["rotor", "centre line of the running shaft at this z"],
      ["line", "wanted hot place of the bearing's centre; 0 unless given"],
      ["closing", "displacement from the state measured to the state run"],
    ],
    sources: [ownRule],
  },
  {
    id: "growth",
    title: "Growth",
    asked: "growth: {length, coefficient | material, hot, cold}",
    says: [
      "From the fixed support up to the centre line, negative if the support stands above. One reason or several, which add up. It is seldom known to a tenth: state its uncertainty. A material of the table gives a mean expansion near room temperature.",
    ],
    formulas: ["growth = a · L · (T_{hot} − T_{cold})"],
    where: [
      ["a", "mean linear expansion"],
      ["L", "from the fixed support to the centre line"],
    ],
    sources: [
      "W. D. Callister, Materials Science and Engineering: An Introduction, appendix B, tables B.1, B.2 and B.6",
      "Special Metals Corporation, publication SMC-045 (2007), tables 2, 3 and 5 (21 to 93 °C)",
      "ASME BPVC section II part D, table TE-1",
    ],
  },
  {
    id: "rotor",
    title: "Running shaft",
    asked: "rotor: {sections, masses, supports, journals}",
    says: [
      "A stepped Euler–Bernoulli beam under its own weight and point masses, on any number of supports at line + running journal, overhangs included: exact however few sections there are. In h it is bent by its bearings alone. Every span is one element; the unknowns are the moments over the supports. The bent line is checked against its own supports.",
      "Shear is left out: it adds some 2 % to the sag of a solid steel shaft whose span is ten diameters.",
    ],
    formulas: ["E · I · y″ = M", "I = π(D⁴ − d⁴)/64", "running v = −radial clearance + lift.v"],
    where: [
      ["y, M", "height of the bent line, bending moment"],
      ["D, d", "outer and inner diameter of a section"],
    ],
    sources: [
      "theorem of three moments, Clapeyron 1857, for stepped spans",
      "S. P. Timoshenko, Strength of Materials I; from memory",
    ],
  },
  {
    id: "wire-sag",
    title: "Sag of a stretched wire",
    asked: "wire: {massPerLength, tension | hungMass, span}",
    says: [
      "How far the wire hangs below its level chord at a station, positive down: the catenary. The parabola is its limit for a taut wire, and is answered beside it. A hung mass is taken times 9.80665 m/s², exact by definition.",
    ],
    formulas: ["sag = (2H/w) · sinh(w · x/2H) · sinh(w · (L − x)/2H)", "taut: w · x · (L − x)/2H"],
    where: [
      ["H", "horizontal tension"],
      ["w", "weight per length"],
      ["x, L", "from one end, and the span"],
    ],
    sources: [ownRule, "3rd CGPM, 1901; ISO 80000-3"],
  },
];
