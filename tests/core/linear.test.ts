import fc from 'fast-check';
import { EigenvalueDecomposition, Matrix, QrDecomposition, solve } from 'ml-matrix';
import { describe, expect, test } from 'vitest';
import { symmetricEigen } from '../../core/linear/symmetric-eigen.ts';
import { thinQr } from '../../core/linear/thin-qr.ts';
import { solveUpper, solveUpperTransposed } from '../../core/linear/triangular.ts';

// What core computes itself for speed or accuracy, held against the library that could do it.

// Nothing so small that its square is no longer a number: a subject's matrix has a trace of 1/N or more.
const entry = fc
  .double({ min: -10, max: 10, noNaN: true })
  .map((x) => (Math.abs(x) < 1e-100 ? 0 : x));
const column = (length: number) =>
  fc.array(entry, { minLength: length, maxLength: length }).map((x) => Float64Array.from(x));

/** max |a − b| over two matrices of one shape. */
const distance = (a: Matrix, b: Matrix): number => Matrix.sub(a, b).abs().max();

describe('eigenvalues of symmetric matrices', () => {
  test('the closed form for two columns agrees with the library', () => {
    fc.assert(
      fc.property(entry, entry, entry, (a, b, d) => {
        const s = new Matrix([
          [a, b],
          [b, d],
        ]);
        const { values, vectors } = symmetricEigen(Float64Array.of(a, b, b, d), 1, 2);
        const theirs = new EigenvalueDecomposition(s, { assumeSymmetric: true }).realEigenvalues;
        const size = Math.max(1e-300, s.clone().abs().max());
        [...values]
          .sort((x, y) => x - y)
          .forEach((value, k) => {
            expect(Math.abs(value - theirs[k]!)).toBeLessThanOrEqual(1e-14 * size);
          });
        const e = Matrix.from1DArray(2, 2, vectors);
        expect(distance(e.transpose().mmul(e), Matrix.eye(2))).toBeLessThan(1e-14);
        const again = e.mmul(Matrix.diag([...values])).mmul(e.transpose());
        expect(distance(again, s)).toBeLessThanOrEqual(1e-14 * size);
      }),
    );
  });

  test('several matrices in a row keep their places', () => {
    const one = [4, 1, 0, 1, 3, 1, 0, 1, 2];
    const two = [1, 0, 0, 0, 1, 0, 0, 0, 0];
    const { values, vectors } = symmetricEigen(Float64Array.from([...one, ...two]), 2, 3);
    [one, two].forEach((s, i) => {
      const e = Matrix.from1DArray(3, 3, vectors.subarray(9 * i, 9 * i + 9));
      const lambda = Matrix.diag([...values.subarray(3 * i, 3 * i + 3)]);
      const again = e.mmul(lambda).mmul(e.transpose());
      expect(distance(again, Matrix.from1DArray(3, 3, s))).toBeLessThan(1e-14);
    });
  });
});

describe('the thin QR of the readings', () => {
  test('is as orthogonal as the Householder QR of the library on nearly collinear columns', () => {
    fc.assert(
      fc.property(column(12), column(12), (x, y) => {
        // The third column is the second but for one part in a hundred million.
        const near = x.map((value, k) => value + 1e-8 * y[k]!);
        const columns = [new Float64Array(12).fill(1), x, near];
        const m = new Matrix(columns).transpose();
        const theirs = new QrDecomposition(m);
        const diagonal = theirs.upperTriangularMatrix.diag().map(Math.abs);
        // Columns that are refused, or whose direction is rounding alone, have no QR to compare.
        fc.pre(diagonal[1]! > 0.1 && diagonal[2]! > 4e-9);
        const { q, r } = thinQr(columns, ['one', 'x', 'near']);
        const own = new Matrix([...q]).transpose();
        expect(distance(own.transpose().mmul(own), Matrix.eye(3))).toBeLessThan(5e-15);
        expect(distance(own.mmul(r), m)).toBeLessThan(5e-15 * m.clone().abs().max());
        diagonal.slice(0, 2).forEach((value, k) => {
          expect(Math.abs(r.get(k, k) / value - 1)).toBeLessThan(1e-12);
        });
      }),
    );
  });
});

describe('substitution in R', () => {
  test('agrees with the library where units are alike', () => {
    fc.assert(
      fc.property(column(6), column(3), (above, b) => {
        const r = new Matrix([
          [11, above[0]!, above[1]!],
          [0, 12, above[2]!],
          [0, 0, 13],
        ]);
        const rhs = Matrix.columnVector(b);
        const up = Matrix.columnVector(solveUpper(r, b));
        const down = Matrix.columnVector(solveUpperTransposed(r, b));
        expect(distance(up, solve(r, rhs))).toBeLessThan(1e-13);
        expect(distance(down, solve(r.transpose(), rhs))).toBeLessThan(1e-13);
      }),
    );
  });
});
