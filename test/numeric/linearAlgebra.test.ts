import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  factorBanded,
  invertWithinBand,
  solveBandedLower,
  solveBandedUpper,
} from "../../lib/numeric/bandedCholesky.ts";
import { factorCholesky, invertPositive, solveCholesky } from "../../lib/numeric/cholesky.ts";
import { leastSquares } from "../../lib/numeric/leastSquares.ts";
import { withR } from "../support/r.ts";

const r = withR();
const entry = fc.double({ min: -3, max: 3, noNaN: true });

/** A + Aᵀ-like positive definite matrix with a band of 2, by row. */
const banded = fc.array(fc.tuple(entry, entry), { minLength: 3, maxLength: 12 }).map((offs) => {
  const n = offs.length;
  const matrix = new Float64Array(n * n);
  offs.forEach(([one, two], i) => {
    matrix[i * n + i] = 13;
    if (i >= 1) matrix[i * n + i - 1] = matrix[(i - 1) * n + i] = one;
    if (i >= 2) matrix[i * n + i - 2] = matrix[(i - 2) * n + i] = two;
  });
  return { n, matrix };
});

describe("Cholesky", () => {
  it("solves what it factored", () => {
    fc.assert(
      fc.property(banded, ({ n, matrix }) => {
        const factor = Float64Array.from(matrix);
        expect(factorCholesky(factor, n)).toBe(true);
        const x = Float64Array.from({ length: n }, (_, i) => i + 1);
        solveCholesky(factor, n, x);
        for (let i = 0; i < n; i++) {
          let sum = 0;
          for (let j = 0; j < n; j++) sum += matrix[i * n + j] * x[j];
          expect(sum).toBeCloseTo(i + 1, 10);
        }
      }),
    );
  });

  it("says when a matrix is singular or indefinite", () => {
    expect(factorCholesky(Float64Array.of(1, 1, 1, 1), 2)).toBe(false);
    expect(invertPositive(Float64Array.of(1, 2, 2, 1), 2)).toBeUndefined();
    expect(Array.from(invertPositive(Float64Array.of(4, 0, 0, 16), 2) ?? [])).toEqual([0.25, 0, 0, 0.0625]);
  });

  it("by bands gives the same solutions, determinant and inverse as without", () => {
    fc.assert(
      fc.property(banded, ({ n, matrix }) => {
        const band = new Float64Array(n * 3);
        for (let i = 0; i < n; i++)
          for (let d = 0; d <= Math.min(2, i); d++) band[i * 3 + d] = matrix[i * n + i - d];
        const logDeterminant = factorBanded(band, n, 2);
        const full = Float64Array.from(matrix);
        factorCholesky(full, n);
        let expected = 0;
        for (let i = 0; i < n; i++) expected += 2 * Math.log(full[i * n + i]);
        expect(logDeterminant).toBeCloseTo(expected, 10);
        const x = Float64Array.from({ length: n }, (_, i) => Math.cos(i));
        const y = Float64Array.from(x);
        solveBandedLower(band, n, 2, x);
        solveBandedUpper(band, n, 2, x);
        solveCholesky(full, n, y);
        x.forEach((value, i) => {
          expect(value).toBeCloseTo(y[i], 10);
        });
        const inside = new Float64Array(n * 3);
        invertWithinBand(band, n, 2, inside);
        const inverse = invertPositive(matrix, n) ?? new Float64Array(0);
        for (let i = 0; i < n; i++) {
          for (let d = 0; d <= Math.min(2, i); d++)
            expect(inside[i * 3 + d]).toBeCloseTo(inverse[i * n + i - d], 10);
        }
      }),
    );
  });
});

describe("leastSquares", () => {
  it("agrees with R's lm on badly scaled columns", async () => {
    const code = "y <- as.numeric(LakeHuron); t <- 1e8 + seq_along(y); f <- lm(y ~ t + I(t - 1e8 > 40))";
    const values = await r.evaluate("LakeHuron");
    const columns = [
      values.map(() => 1),
      values.map((_, i) => i + 1),
      values.map((_, i) => (i + 1 > 40 ? 1 : 0)),
    ];
    const fit = leastSquares(columns, values);
    // The slope and the step do not depend on where time starts; R is given a far origin, we a near one.
    const [slope, step, deviance] = await r.evaluate(`${code}; c(coef(f)[2:3], deviance(f))`);
    expect(fit?.coefficients[1]).toBeCloseTo(slope, 8);
    expect(fit?.coefficients[2]).toBeCloseTo(step, 8);
    expect(fit?.residualSumOfSquares).toBeCloseTo(deviance, 8);
  });

  it("keeps full accuracy where normal equations lose half the digits", () => {
    // Läuchli's (1961) matrix: columns (1, ε, 0), (1, 0, ε); XᵀX rounds to a singular matrix at ε = 1e-9.
    const e = 1e-9;
    const fit = leastSquares(
      [
        [1, e, 0],
        [1, 0, e],
      ],
      [2, e, e],
    );
    expect(fit?.coefficients[0]).toBeCloseTo(1, 6);
    expect(fit?.coefficients[1]).toBeCloseTo(1, 6);
  });

  it("has residuals orthogonal to its columns, that sum up to the response", () => {
    const columns = [
      [1, 1, 1, 1, 1],
      [1, 2, 3, 4, 5],
    ];
    const response = [1, 3, 2, 5, 4];
    const fit = leastSquares(columns, response);
    for (const column of columns) {
      expect(
        column.reduce((sum, value, i) => sum + value * (fit?.residuals[i] ?? Number.NaN), 0),
      ).toBeCloseTo(0, 12);
    }
    const { coefficients = [], residuals = [] } = fit ?? {};
    response.forEach((value, i) => {
      expect(coefficients[0] + coefficients[1] * columns[1][i] + residuals[i]).toBeCloseTo(value, 12);
    });
  });

  it("refuses dependent columns and too few rows", () => {
    expect(
      leastSquares(
        [
          [1, 2, 3],
          [2, 4, 6],
        ],
        [1, 2, 3],
      ),
    ).toBeUndefined();
    expect(leastSquares([[1], [2]], [1])).toBeUndefined();
    expect(leastSquares([[0, 0]], [1, 2])).toBeUndefined();
  });
});
