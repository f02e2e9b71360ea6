import { describe, expect, it } from "vitest";
import { findBreaks } from "../../lib/drift/findBreaks.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("findBreaks", () => {
  // R 4.2.2, strucchange 1.5.3: breakpoints(Nile ~ 1), confint, Fstats.
  it("dates the fall of the Nile's flow after 1898 as strucchange does", async () => {
    const nile = await r.evaluate("datasets::Nile");
    const found = findBreaks(nile);
    expect(found.breaks).toEqual([{ index: 28, low: 25, high: 32 }]);
    expect(1871 + found.breaks[0].index).toBe(1899); // the first year of the lower flow
    expect(found.criteria.map(({ sumOfSquares }) => sumOfSquares / 1597457.1944444445)[1]).toBeCloseTo(1, 10);
    const bic = [1318.2418068761806, 1270.083735739566, 1276.4667007553514, 1284.7176674489144];
    found.criteria.slice(0, 4).forEach((one, m) => {
      expect(one.bic).toBeCloseTo(bic[m], 8);
    });
    expect(found.criteria.slice(2, 5).map(({ indexes }) => indexes)).toEqual([
      [28, 83],
      [28, 68, 83],
      [28, 45, 68, 83],
    ]);
    expect(found.supF).toBeCloseTo(75.929769427485425, 8);
    expect(found.pValue).toBeLessThan(1e-10);
  });

  // strucchange 1.5.3: breakpoints(y ~ lag(y, -1)); its row 27 is the 28th value.
  it("finds the same date in an AR(1) regression of the Nile", async () => {
    const nile = await r.evaluate("datasets::Nile");
    const found = findBreaks(nile, { order: 1 });
    expect(found.breaks).toEqual([{ index: 28, low: 24, high: 33 }]);
    expect(found.supF).toBeCloseTo(31.561450940712263, 8);
  });

  it("finds no break in the hormone series lh by BIC, as a direct search in R does", async () => {
    const lh = await r.evaluate("datasets::lh");
    const found = findBreaks(lh, { order: 1, minSegment: 0.2, maxBreaks: 3 });
    expect(found.breaks).toEqual([]);
    const sums = [9.477327223148007, 7.644908254172997, 7.0817454726798506, 6.685849178022384];
    found.criteria.forEach((one, m) => {
      expect(one.sumOfSquares).toBeCloseTo(sums[m], 9);
    });
  });

  // Zeileis, Kleiber, Krämer and Hornik (2003), table of breakpoints of the seatbelt regression on the values one
  // and twelve months before: 1973(10) and 1983(1) are the last months of their segments.
  it("finds the oil crisis and the seatbelt law in the UK driver deaths", async () => {
    const deaths = await r.evaluate("log10(datasets::UKDriverDeaths)");
    const aYearBefore = deaths.map((_, month) => deaths[month - 12] ?? Number.NaN);
    const found = findBreaks(deaths, { order: 1, regressors: [aYearBefore], minSegment: 0.1 });
    const two = found.criteria[2].indexes.map((month) => 1969 + month / 12);
    expect(two).toEqual([1969 + 58 / 12, 1969 + 169 / 12]); // November 1973, February 1983
    expect(found.pValue).toBeLessThan(0.01);
  });

  it("leaves rows that touch a gap out and keeps counting periods", async () => {
    const nile = await r.evaluate("datasets::Nile");
    const holed = nile.map((value, year) => (year === 10 || year === 60 ? Number.NaN : value));
    const { breaks } = findBreaks(holed);
    expect(breaks.map(({ index }) => index)).toEqual([28]);
  });

  it("agrees with least squares in R on every segment of the best partition with a regressor", async () => {
    const temperatures = await r.evaluate("datasets::nhtemp");
    const line = temperatures.map((_, year) => year);
    const found = findBreaks(temperatures, { regressors: [line], maxBreaks: 2 });
    const [first, second] = found.criteria[2].indexes;
    await r.assign("y", temperatures);
    const segments = `list(1:${first}, ${first + 1}:${second}, ${second + 1}:60)`;
    const [sum] = await r.evaluate(`sum(sapply(${segments}, function(rows) deviance(lm(y[rows] ~ rows))))`);
    expect(found.criteria[2].sumOfSquares).toBeCloseTo(sum, 8);
  });

  it("finds the same however far from zero the values lie", async () => {
    const nile = await r.evaluate("datasets::Nile");
    const near = findBreaks(nile, { order: 1 });
    const far = findBreaks(
      nile.map((value) => value + 1e9),
      { order: 1 },
    );
    expect(far.breaks).toEqual(near.breaks);
    expect(far.supF).toBeCloseTo(near.supF, 6);
  });

  it("says what it needs when segments would be too short", () => {
    expect(() => findBreaks([1, 2, 3], { order: 1 })).toThrow(
      /findBreaks needs segments of more than 2 rows/,
    );
    expect(() => findBreaks([1, 2, 3, 4], { regressors: [[1, 2]] })).toThrow(/regressors of length 4, got 2/);
  });
});
