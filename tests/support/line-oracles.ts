import loadHighs from "highs";

/** One station as the oracles see it: in one plane, or in both. */
export interface OracleStation {
  readonly z: number;
  readonly h: number;
  readonly v: number;
  readonly weight: number;
}

/** h = line[0] + line[1]·z, v = line[2] + line[3]·z. */
export type OracleLine = readonly [number, number, number, number];

const distanceFrom = ({ z, h, v, weight }: OracleStation, [a, b, c, d]: OracleLine) =>
  weight * Math.hypot(h - a - b * z, v - c - d * z);

/** Largest weight × radial distance, written down plainly. */
export const largestOf = (stations: readonly OracleStation[], line: OracleLine) =>
  Math.max(...stations.map((station) => distanceFrom(station, line)));

/** Sum of weight × radial distance. */
export const sumOf = (stations: readonly OracleStation[], line: OracleLine) =>
  stations.reduce((sum, station) => sum + distanceFrom(station, line), 0);

/**
 * The least largest weight·|h − a − b·z|, by brute force: by linear programming duality it is the greatest of those of
 * any three stations, or of two at one z, each found by hand from the one combination that no line changes.
 */
export function zoneOfTriples(stations: readonly OracleStation[]): number {
  let most = 0;
  const consider = (chosen: readonly OracleStation[], factors: readonly number[]) => {
    const size = factors.reduce((sum, factor, i) => sum + Math.abs(factor) / chosen[i]!.weight, 0);
    const value = Math.abs(factors.reduce((sum, factor, i) => sum + factor * chosen[i]!.h, 0));
    if (size > 0) most = Math.max(most, value / size);
  };
  for (const [i, a] of stations.entries()) {
    for (const [j, b] of stations.slice(i + 1).entries()) {
      if (a.z === b.z) consider([a, b], [1, -1]);
      for (const c of stations.slice(i + j + 2)) consider([a, b, c], [c.z - b.z, a.z - c.z, b.z - a.z]);
    }
  }
  return most;
}

/** Every line h = a + b·z through two stations. */
export function linesOfPairs(stations: readonly OracleStation[]): OracleLine[] {
  return stations.flatMap((a, i) =>
    stations.slice(i + 1).flatMap((b): OracleLine[] => {
      const slope = (b.h - a.h) / (b.z - a.z);
      return a.z === b.z ? [] : [[a.h - slope * a.z, slope, 0, 0]];
    }),
  );
}

/** The least Σ weight·|h − a − b·z|, by brute force: some line through two stations has it. */
export function sumOfPairs(stations: readonly OracleStation[]): number {
  const flat = stations.map((station) => ({ ...station, v: 0 }));
  return Math.min(...linesOfPairs(flat).map((line) => sumOf(flat, line)));
}

let loaded: ReturnType<typeof loadHighs> | null = null;

/** The same two by HiGHS, as linear programs in a, b and the distances. */
export async function byHighs(aim: "largest" | "sum", stations: readonly OracleStation[]): Promise<number> {
  const highs = await (loaded ??= loadHighs());
  const bound = (i: number) => (aim === "largest" ? "t" : `t${i}`);
  const term = (value: number, name: string) => `${value < 0 ? "-" : "+"} ${Math.abs(value)} ${name}`;
  const rows = stations.flatMap(({ z, h, weight }, i) =>
    [1, -1].map(
      (sign, side) =>
        `r${i}s${side}: ${term(sign, "a")} ${term(sign * z, "b")} + ${1 / weight} ${bound(i)} >= ${sign * h}`,
    ),
  );
  const bounds = aim === "largest" ? ["t"] : stations.map((_, i) => bound(i));
  const text = `Minimize\n obj: ${bounds.join(" + ")}\nSubject To\n ${rows.join("\n ")}\nBounds\n a free\n b free\nEnd\n`;
  const answer = highs.solve(text, { output_flag: false });
  if (answer.Status !== "Optimal") throw new Error(`HiGHS ended with ${answer.Status}`);
  return answer.ObjectiveValue;
}

/** Downhill simplex of Nelder and Mead, started anew at its best until that gains nothing. No derivative at all. */
export function nelderMead(
  f: (line: OracleLine) => number,
  start: OracleLine,
  steps: OracleLine,
): { readonly line: OracleLine; readonly value: number } {
  let best = { line: start, value: f(start) };
  for (let restart = 0; restart < 20; restart += 1) {
    const size = 0.3 ** (restart % 10);
    const found = simplex(
      f,
      best.line,
      steps.map((step) => step * size * (restart % 2 ? -1 : 1)),
    );
    if (found.value < best.value) best = found;
  }
  return best;
}

function simplex(f: (line: OracleLine) => number, start: OracleLine, steps: readonly number[]) {
  const at = (line: readonly number[]) => ({
    line: line as unknown as OracleLine,
    value: f(line as unknown as OracleLine),
  });
  let corners = [start, ...steps.map((step, k) => start.map((value, i) => value + (i === k ? step : 0)))].map(
    at,
  );
  for (let round = 0; round < 300; round += 1) {
    corners = [...corners].sort((a, b) => a.value - b.value);
    const [first, worst] = [corners[0]!, corners.at(-1)!];
    if (worst.value - first.value <= 1e-15 * first.value) break;
    const rest = corners.slice(0, -1);
    const middle = start.map((_, i) => rest.reduce((sum, corner) => sum + corner.line[i]!, 0) / rest.length);
    const along = (share: number) => at(middle.map((value, i) => value + share * (worst.line[i]! - value)));
    const reflected = along(-1);
    if (reflected.value < first.value) {
      const expanded = along(-2);
      corners = [...rest, expanded.value < reflected.value ? expanded : reflected];
      continue;
    }
    if (reflected.value < rest.at(-1)!.value) {
      corners = [...rest, reflected];
      continue;
    }
    const contracted = along(reflected.value < worst.value ? -0.5 : 0.5);
    corners =
      contracted.value < Math.min(reflected.value, worst.value)
        ? [...rest, contracted]
        : corners.map(({ line }) => at(line.map((value, i) => (value + first.line[i]!) / 2)));
  }
  return corners.reduce((least, corner) => (corner.value < least.value ? corner : least));
}
