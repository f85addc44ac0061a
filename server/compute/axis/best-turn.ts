/** Points in one plane, by column. Weights are above 0. */
export interface Points {
  readonly z: Float64Array;
  readonly y: Float64Array;
  readonly weight: Float64Array;
}

/** A linear reward for the line y = at0 + slope·z, taken off its sum: what other points, all on one side, pull with. */
export interface Pull {
  readonly at0: number;
  readonly slope: number;
}

/** One end of the slopes of least sum, and a point that the line with that slope passes through. */
export interface TurnEnd {
  readonly slope: number;
  readonly through: number;
}

/** Sums of weights that differ by less than this share of them all are equal. */
const equalShare = 1e-12;

/**
 * The slopes for which Σ weight·|y − line| − pull is least among lines through one point: all between `low` and `high`,
 * usually one. They are the weighted medians of the slopes to the other points, each weighing its weight × distance
 * along z, moved off the middle by the pull. Null when the pull is the stronger: then the sum falls without end.
 * O(n log n).
 */
export function bestTurn(
  { z, y, weight }: Points,
  pivot: number,
  pull: Pull,
): { readonly low: TurnEnd; readonly high: TurnEnd } | null {
  const slopes = new Float64Array(z.length);
  const arms = new Float64Array(z.length);
  const others: number[] = [];
  let total = 0;
  for (let j = 0; j < z.length; j += 1) {
    const arm = z[j]! - z[pivot]!;
    if (arm === 0) continue;
    slopes[j] = (y[j]! - y[pivot]!) / arm;
    arms[j] = weight[j]! * Math.abs(arm);
    total += arms[j]!;
    others.push(j);
  }
  others.sort((a, b) => slopes[a]! - slopes[b]! || a - b);
  const turning = pull.slope - pull.at0 * z[pivot]!;
  if (Math.abs(turning) > total * (1 + equalShare)) return null;
  const half = (total + turning) / 2;
  const tie = equalShare * total;
  let before = 0;
  let low: TurnEnd | null = null;
  let end: TurnEnd = { slope: 0, through: pivot };
  for (const j of others) {
    before += arms[j]!;
    end = { slope: slopes[j]!, through: j };
    if (low === null && before >= half - tie) low = end;
    if (before > half + tie) break;
  }
  return { low: low ?? end, high: end };
}
