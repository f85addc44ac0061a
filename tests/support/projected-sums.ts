import { Matrix, SingularValueDecomposition } from "ml-matrix";
import type { PlaneVector } from "../../server/compute/plane.ts";
import type { CrossedReadings } from "../../server/compute/repeatability/crossed-sums.ts";

/** Σ of the squares of what a design's columns explain: y'Py, P from a singular value decomposition. */
function explained(columns: number[][], y: number[]): { sum: number; rank: number } {
  const svd = new SingularValueDecomposition(new Matrix(columns), { autoTranspose: true });
  const rank = svd.rank;
  const left = svd.leftSingularVectors;
  let sum = 0;
  for (let c = 0; c < rank; c += 1) {
    let along = 0;
    for (let row = 0; row < y.length; row += 1) along += left.get(row, c) * y[row]!;
    sum += along * along;
  }
  return { sum, rank };
}

/** Direct sums of squares by projection: nested designs, one after the other. */
export function projectedSums(readings: CrossedReadings, of: (vector: PlaneVector) => number) {
  const rows = readings.flatMap((people, i) =>
    people.flatMap((trials, j) => trials.map((vector) => ({ i, j, y: of(vector) }))),
  );
  const [a, b] = [readings.length, readings[0]!.length];
  const y = rows.map((row) => row.y);
  const one = (flag: boolean) => (flag ? 1 : 0);
  const design = (stations: boolean, people: boolean, cells: boolean) =>
    rows.map(({ i, j }) => [
      1,
      ...(stations ? Array.from({ length: a }, (_, k) => one(k === i)) : []),
      ...(people ? Array.from({ length: b }, (_, k) => one(k === j)) : []),
      ...(cells ? Array.from({ length: a * b }, (_, k) => one(k === i * b + j)) : []),
    ]);
  const [mean, withStations, withPeople, both, full] = [
    design(false, false, false),
    design(true, false, false),
    design(false, true, false),
    design(true, true, false),
    design(true, true, true),
  ].map((columns) => explained(columns, y));
  const total = y.reduce((sum, value) => sum + value * value, 0);
  return {
    station: { sum: withStations!.sum - mean!.sum, dof: withStations!.rank - 1 },
    person: { sum: withPeople!.sum - mean!.sum, dof: withPeople!.rank - 1 },
    interaction: { sum: full!.sum - both!.sum, dof: full!.rank - both!.rank },
    repeatability: { sum: total - full!.sum, dof: y.length - full!.rank },
    total: { sum: total - mean!.sum, dof: y.length - 1 },
  };
}
