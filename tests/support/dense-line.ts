import { inverse, Matrix, pseudoInverse } from "ml-matrix";
import type { StationChange } from "../../server/compute/confirmation/survey-change.ts";

/**
 * The common shift and tilt of some changes with whole matrices and nothing clever: p = (BᵀΣ⁻¹B)⁻¹BᵀΣ⁻¹Δ, Σ the
 * block-diagonal covariance of all of them. An oracle for small surveys whose z lie between 0 and some thousands.
 */
export function denseLine(changes: readonly StationChange[], through: readonly number[]) {
  const design = (zMm: number) => [
    [1, 0, zMm / 1000, 0],
    [0, 1, 0, zMm / 1000],
  ];
  const b = new Matrix(through.flatMap((index) => design(changes[index]!.zMm)));
  const d = Matrix.columnVector(
    through.flatMap((index) => [changes[index]!.change.hMm, changes[index]!.change.vMm]),
  );
  const sigma = Matrix.zeros(2 * through.length, 2 * through.length);
  through.forEach((index, i) => putCovariance(sigma, 2 * i, changes[index]!.error!.total));
  const weight = inverse(sigma);
  const gain = inverse(b.transpose().mmul(weight).mmul(b)).mmul(b.transpose()).mmul(weight);
  const p = gain.mmul(d);

  /** A station's deviation from the line as a linear function of all changes, the station's own last. */
  const rowsFor = (index: number) => {
    const rows = Matrix.zeros(2, 2 * through.length + 2);
    const line = new Matrix(design(changes[index]!.zMm)).mmul(gain);
    rows.setSubMatrix(line.mul(-1), 0, 0);
    const place = through.indexOf(index);
    const own = place < 0 ? 2 * through.length : 2 * place;
    for (const k of [0, 1]) rows.set(k, own + k, rows.get(k, own + k) + 1);
    return rows;
  };
  const wholeSigma = (index: number, part: number | null) => {
    const whole = Matrix.zeros(2 * through.length + 2, 2 * through.length + 2);
    [...through, index].forEach((each, i) => {
      const { total, parts } = changes[each]!.error!;
      putCovariance(whole, 2 * i, part === null ? total : parts[part]!.covariance);
    });
    return whole;
  };
  return {
    parameters: {
      h: { at0Mm: p.get(0, 0), slope: p.get(2, 0) / 1000 },
      v: { at0Mm: p.get(1, 0), slope: p.get(3, 0) / 1000 },
    },
    covarianceOf: (index: number) => {
      const rows = rowsFor(index);
      return rows.mmul(wholeSigma(index, null)).mmul(rows.transpose());
    },
    /** Variances along a direction, of each station's each survey, in the order through and own, before and after. */
    variancesAlong: (index: number, direction: readonly [number, number]) => {
      const along = Matrix.rowVector([...direction]).mmul(rowsFor(index));
      return [...through, index].flatMap((each, i) =>
        changes[each]!.error!.parts.map(({ covariance, dof }) => {
          const block = Matrix.zeros(2, 2);
          putCovariance(block, 0, covariance);
          const own = along.subMatrix(0, 0, 2 * i, 2 * i + 1);
          return { variance: own.mmul(block).mmul(own.transpose()).get(0, 0), dof };
        }),
      );
    },
    solve: (covariance: Matrix, vector: readonly [number, number]) =>
      pseudoInverse(covariance).mmul(Matrix.columnVector([...vector])),
  };
}

function putCovariance(
  into: Matrix,
  at: number,
  { hhMm2, hvMm2, vvMm2 }: { readonly hhMm2: number; readonly hvMm2: number; readonly vvMm2: number },
): void {
  into.set(at, at, hhMm2);
  into.set(at, at + 1, hvMm2);
  into.set(at + 1, at, hvMm2);
  into.set(at + 1, at + 1, vvMm2);
}
