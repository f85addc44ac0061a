import loadHighs from "highs";

export type Pair = readonly [number, number];
export type Criterion = "minimum_zone" | "maximum_inscribed" | "minimum_circumscribed";

/** Least and most of |p − c| − added, written down plainly. */
export function extremesAt(points: readonly Pair[], [a, b]: Pair, added?: readonly number[]) {
  let least = Infinity;
  let most = -Infinity;
  for (const [i, [h, v]] of points.entries()) {
    const g = Math.hypot(h - a, v - b) - (added?.[i] ?? 0);
    least = Math.min(least, g);
    most = Math.max(most, g);
  }
  return { least, most };
}

/** What the criterion makes small. */
export function costAt(
  criterion: Criterion,
  points: readonly Pair[],
  centre: Pair,
  added?: readonly number[],
): number {
  const { least, most } = extremesAt(points, centre, added);
  if (criterion === "minimum_zone") return most - least;
  return criterion === "minimum_circumscribed" ? most : -least;
}

/** a·h + b·v = c: the places equally far from two points. */
type Line = readonly [number, number, number];

function bisectors(points: readonly Pair[]): { line: Line; of: readonly [number, number] }[] {
  return points.flatMap((p, i) =>
    points.slice(i + 1).map((q, k) => ({
      line: [q[0] - p[0], q[1] - p[1], (q[0] ** 2 + q[1] ** 2 - p[0] ** 2 - p[1] ** 2) / 2] as const,
      of: [i, i + 1 + k] as const,
    })),
  );
}

function meet([a, b, c]: Line, [d, e, f]: Line): Pair | null {
  const determinant = a * e - b * d;
  if (Math.abs(determinant) < 1e-9) return null;
  return [(c * e - b * f) / determinant, (a * f - c * d) / determinant];
}

/** Smallest circle round the points, by the circles on all pairs and through all triples. */
export function circumscribedByTriples(points: readonly Pair[]): number {
  const lines = bisectors(points);
  let least = Infinity;
  for (const { of } of lines) {
    const [p, q] = [points[of[0]]!, points[of[1]]!];
    least = Math.min(least, extremesAt(points, [(p[0] + q[0]) / 2, (p[1] + q[1]) / 2]).most);
  }
  return centresOfTriples(points).reduce((r, centre) => Math.min(r, extremesAt(points, centre).most), least);
}

function centresOfTriples(points: readonly Pair[]): Pair[] {
  const lines = bisectors(points);
  return lines.flatMap((one, k) =>
    lines.slice(k + 1).flatMap((other) => {
      const centre = one.of[0] === other.of[0] ? meet(one.line, other.line) : null;
      return centre === null ? [] : [centre];
    }),
  );
}

/** Whether the points leave no gap over 180° as seen from the place: it lies in their convex hull. */
export function isBetween(points: readonly Pair[], [a, b]: Pair, slackRad = 1e-12): boolean {
  const angles = points.map(([h, v]) => Math.atan2(v - b, h - a)).sort((one, other) => one - other);
  return angles.every((angle, k) => {
    const next = k + 1 < angles.length ? angles[k + 1]! : angles[0]! + 2 * Math.PI;
    return next - angle <= Math.PI + slackRad;
  });
}

/**
 * Largest circle with no point inside: of all centres of triples between the points (`within`), and of the centres
 * on the sides of their hull (`onSide`), where it can still grow.
 */
export function inscribedByTriples(points: readonly Pair[]): { within: number; onSide: number } {
  const within = centresOfTriples(points)
    .filter((centre) => isBetween(points, centre))
    .reduce((r, centre) => Math.max(r, extremesAt(points, centre).least), -Infinity);
  let onSide = -Infinity;
  for (const [i, p] of points.entries()) {
    for (const [j, q] of points.entries()) {
      const [dh, dv] = [q[0] - p[0], q[1] - p[1]];
      const left = points.every(([h, v]) => dh * (v - p[1]) - dv * (h - p[0]) >= -1e-12);
      if (i === j || (dh === 0 && dv === 0) || !left) continue;
      for (const { line } of bisectors(points)) {
        const slope = line[0] * dh + line[1] * dv;
        const share = (line[2] - line[0] * p[0] - line[1] * p[1]) / slope;
        if (!(share >= 0 && share <= 1)) continue;
        onSide = Math.max(onSide, extremesAt(points, [p[0] + share * dh, p[1] + share * dv]).least);
      }
    }
  }
  return { within, onSide };
}

/**
 * Narrowest zone by brute force: its centre lies where two bisectors meet, of two outer and two inner contacts, or of
 * three of a kind; every such place is looked at. And the narrowest strip, with a side along two points.
 */
export function zoneByQuadruples(points: readonly Pair[]): { circular: number; strip: number } {
  const lines = bisectors(points).map(({ line }) => line);
  let circular = Infinity;
  for (const [k, one] of lines.entries()) {
    for (const other of lines.slice(k + 1)) {
      const centre = meet(one, other);
      if (centre !== null) circular = Math.min(circular, costAt("minimum_zone", points, centre));
    }
  }
  let strip = Infinity;
  for (const [dh, dv] of lines) {
    const length = Math.hypot(dh, dv);
    if (length === 0) continue;
    const across = points.map(([h, v]) => (h * dv - v * dh) / length);
    strip = Math.min(strip, Math.max(...across) - Math.min(...across));
  }
  return { circular, strip };
}

/** J. A. Nelder, R. Mead, Computer Journal 7 (1965) 308: a search that knows nothing of contacts. */
export function nelderMead(cost: (at: Pair) => number, start: Pair, size: number): number {
  const corner = (h: number, v: number) => ({ h, v, value: cost([h, v]) });
  let simplex = [corner(...start), corner(start[0] + size, start[1]), corner(start[0], start[1] + size)];
  for (let round = 0; round < 300; round++) {
    simplex.sort((one, other) => one.value - other.value);
    const [best, good, worst] = simplex as [(typeof simplex)[0], (typeof simplex)[0], (typeof simplex)[0]];
    const along = (share: number) => {
      const [h, v] = [(best.h + good.h) / 2, (best.v + good.v) / 2];
      return corner(h + share * (worst.h - h), v + share * (worst.v - v));
    };
    const reflected = along(-1);
    if (reflected.value < best.value) {
      const expanded = along(-2);
      simplex = [best, good, expanded.value < reflected.value ? expanded : reflected];
    } else if (reflected.value < good.value) {
      simplex = [best, good, reflected];
    } else {
      const pulled = along(reflected.value < worst.value ? -0.5 : 0.5);
      simplex =
        pulled.value < Math.min(reflected.value, worst.value)
          ? [best, good, pulled]
          : [best, ...[good, worst].map(({ h, v }) => corner((h + best.h) / 2, (v + best.v) / 2))];
    }
  }
  return Math.min(...simplex.map(({ value }) => value));
}

let loaded: ReturnType<typeof loadHighs> | null = null;

/**
 * The narrowest zone of the distances' tangents at a centre, over steps within a box, by the linear programs of HiGHS:
 * minimise w with t + w ≥ dᵢ + s·δ ≥ t for every point.
 */
export async function zoneOfTangents(points: readonly Pair[], [a, b]: Pair, box: number): Promise<number> {
  const rows = points.flatMap(([h, v], i) => {
    const d = Math.hypot(h - a, v - b);
    const slope = `${((a - h) / d).toFixed(16)} x + ${((b - v) / d).toFixed(16)} y`;
    return [` o${i}: t + w - ${slope.replace(" + ", " - ")} >= ${d}`, ` i${i}: ${slope} - t >= ${-d}`];
  });
  const tidy = rows.map((row) => row.replaceAll("- -", "+ ").replaceAll("+ -", "- "));
  const text = `Minimize\n obj: w\nSubject To\n${tidy.join("\n")}\nBounds\n -${box} <= x <= ${box}\n -${box} <= y <= ${box}\n t free\nEnd\n`;
  const highs = await (loaded ??= loadHighs());
  const answer = highs.solve(text, { output_flag: false });
  if (answer.Status !== "Optimal") throw new Error(`HiGHS: ${answer.Status}`);
  return answer.ObjectiveValue;
}
