import { ownRule, type Method } from "../method.ts";

/** How each form of reading becomes points on the wall, or a centre. */
export const readingForms: readonly Method[] = [
  {
    id: "points",
    title: "Points",
    asked: "form: points",
    says: [
      "Points on the wall from any origin of the cross-section; the centre answered is relative to that origin. `z` from the station's plane may be stated for all points of a bore or for none.",
      "Points at two or more planes without a taper are fitted as a tilted cylinder: centre, size and two slopes.",
    ],
    formulas: [],
    where: [],
    sources: [ownRule],
  },
  {
    id: "turned-gauge",
    title: "Turned gauge",
    asked: "form: turned_gauge",
    says: [
      "A gauge turned about its own axis, which need not be the bore's. Readings become points about that axis and a circle is fitted to them: exact, not the small-offset harmonic shortcut. Readings are sent as read, never halved.",
      "With `zero: arbitrary` the gauge reads 0 anywhere, so the diameter is not known and is answered as null.",
    ],
    formulas: ["r_i = D/2 ± reading_i", "h_i = r_i · sin(clockDeg_i)", "v_i = r_i · cos(clockDeg_i) − sag"],
    where: [
      ["D", "nominal diameter"],
      ["±", "plus for larger_is_farther, minus for larger_is_nearer"],
      ["sag", "gaugeSag: how far the tip hangs below its axis, positive"],
    ],
    sources: [ownRule],
  },
  {
    id: "wire",
    title: "Stretched wire",
    asked: "form: wire",
    says: [
      "Inside readings to the wall at left, right and bottom, and at the top if the upper half is on. Readings to the wire's surface get half its diameter. The circle through three is exact; four are fitted by least squares. The centre is relative to the straight chord of the wire.",
    ],
    formulas: ["r_i = reading_i + d/2", "v = v about the wire − sag"],
    where: [
      ["d", "wireDiameter for measuredTo: surface, 0 for centre"],
      ["sag", "how far the wire hangs below its chord at this z"],
    ],
    sources: [ownRule],
  },
  {
    id: "rotating-target",
    title: "Rotating target",
    asked: "form: rotating_target",
    says: [
      "A position-sensing target turned about the bore's own centre on a bracket, read in its own frame at each clock angle. In complex numbers, h + i·v, the spot at turn t is c + e·exp(i·t). Linear least squares in c and e has a closed form. The centre relative to the beam is −e; there is no diameter.",
      "Two angles determine it, three or more leave something to check by. If the bracket follows the wall instead, send points.",
    ],
    formulas: [
      "e = Σ w · conj(f − f_m) · (s − s_m) / Σ w · |f − f_m|²",
      "variance of each coordinate = 1 / Σ w · |f − f_m|²",
    ],
    where: [
      ["s, f", "spot, and exp(i·t) of its turn"],
      ["f_m, s_m", "their weighted means"],
      ["w", "1/u² of the spot"],
      ["c, e", "the target's mounting error; the beam relative to the bore's centre"],
    ],
    sources: [ownRule],
  },
];
