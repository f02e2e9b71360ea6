import { describe, expect, it } from "vitest";
import { dickeyFullerTest } from "../../lib/autoregression/dickeyFuller.ts";
import {
  dickeyFullerCriticalValues,
  dickeyFullerGlsCriticalValues,
  dickeyFullerGlsPValue,
  dickeyFullerPValue,
} from "../../lib/autoregression/dickeyFullerDistribution.ts";
import { fullerCriticalValues, fullerPValue } from "../../lib/autoregression/fullerTables.ts";
import { unitRootTest } from "../../lib/autoregression/unitRootTest.ts";
import { shockFading } from "../../lib/dynamics/shockFading.ts";
import { simulate } from "../support/arbitraryProcess.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("dickeyFullerTest", () => {
  // R 4.2.2, urca 1.3.3: ur.df(Nile, type, lags); statsmodels 0.13.5: adfuller for p-value and critical values.
  it("agrees with urca and statsmodels on Nile", async () => {
    const nile = await r.evaluate("Nile");
    const at = (terms: "none" | "constant" | "trend", lags: number) =>
      dickeyFullerTest(nile, { terms, lags });
    expect(at("none", 1).statistic).toBeCloseTo(-0.963877722044265, 8);
    expect(at("constant", 4).statistic).toBeCloseTo(-2.781958122322528, 8);
    expect(at("constant", 4).jointStatistics.constantAndRoot).toBeCloseTo(4.066395512521812, 7);
    expect(at("trend", 1).statistic).toBeCloseTo(-4.790765517983121, 8);
    expect(at("trend", 1).jointStatistics.constantAndRoot).toBeCloseTo(7.71078873189868, 7);
    expect(at("trend", 1).jointStatistics.trendAndRoot).toBeCloseTo(11.478744460126112, 7);
    expect(at("constant", 4).pValue).toBeCloseTo(0.06089749528453366, 8);
    expect(at("constant", 4).criticalValues.map(({ value }) => value)).toEqual([
      expect.closeTo(-3.5011373281819504, 8),
      expect.closeTo(-2.8924800524857854, 8),
      expect.closeTo(-2.5832749307479226, 8),
    ]);
  });

  it("chooses its lags by AIC on one sample, as statsmodels' adfuller(maxlag = 8) does", async () => {
    const chosen = dickeyFullerTest(await r.evaluate("nhtemp"), { terms: "trend", maxLags: 8 });
    expect(chosen.lags).toBe(0);
    expect(chosen.statistic).toBeCloseTo(-6.687579353260692, 8);
  });

  it("has the distribution of MacKinnon (1994, 2010)", () => {
    // statsmodels 0.13.5, tsa.adfvalues.mackinnonp.
    expect(dickeyFullerPValue("none", -2)).toBeCloseTo(0.043520623056049056, 9);
    expect(dickeyFullerPValue("constant", -3)).toBeCloseTo(0.034894400275345266, 9);
    expect(dickeyFullerPValue("trend", -0.3)).toBeCloseTo(0.9895172530712344, 9);
    expect(dickeyFullerPValue("constant", 3)).toBe(1);
    expect(dickeyFullerPValue("constant", -30)).toBe(0);
    // The printed asymptotic table: MacKinnon (2010), table 2.
    expect(dickeyFullerCriticalValues("trend", Number.POSITIVE_INFINITY).map(({ value }) => value)).toEqual([
      -3.95877, -3.41049, -3.12705,
    ]);
  });
});

describe("Fuller's printed table", () => {
  it("gives the p-value of R's tseries::adf.test on lh, clipped at its ends", async () => {
    // R 4.2.2, tseries 0.10.53: adf.test(lh), statistic −3.557993615142599, lag order 3, p-value 0.0462424.
    const test = dickeyFullerTest(await r.evaluate("lh"), { terms: "trend", lags: 3 });
    expect(test.statistic).toBeCloseTo(-3.557993615142599, 8);
    expect(fullerPValue("trend", test.statistic, 47)).toBeCloseTo(0.046242351704036046, 8);
    expect(fullerPValue("constant", -9, 47)).toBe(0.01);
    expect(fullerPValue("constant", 9, 47)).toBe(0.99);
  });

  it("lies within 0.03 of MacKinnon's surfaces, which replaced it", () => {
    for (const n of [25, 50, 100, 250]) {
      const printed = fullerCriticalValues("constant", n);
      dickeyFullerCriticalValues("constant", n).forEach(({ value }, i) => {
        expect(Math.abs(value - printed[i].value)).toBeLessThan(0.03);
      });
    }
  });
});

describe("unitRootTest", () => {
  // R 4.2.2, urca 1.3.3: ur.ers(type = "DF-GLS", lag.max) and ur.kpss(use.lag).
  it("agrees with urca on Nile and nhtemp", async () => {
    const nile = await r.evaluate("Nile");
    const nhtemp = await r.evaluate("nhtemp");
    const gls = (values: number[], trend: boolean, lags: number) =>
      unitRootTest(values, { kind: "dickey-fuller-gls", trend, lags }).statistic;
    expect(gls(nile, false, 1)).toBeCloseTo(-2.808719753421387, 8);
    expect(gls(nile, true, 4)).toBeCloseTo(-3.2245909673502617, 8);
    expect(gls(nhtemp, true, 1)).toBeCloseTo(-4.408390735928882, 8);
    const kpss = (values: number[], trend: boolean, lags: number) =>
      unitRootTest(values, { kind: "kpss", trend, lags }).statistic;
    expect(kpss(nile, false, 4)).toBeCloseTo(0.9654349077526608, 9);
    expect(kpss(nile, false, 12)).toBeCloseTo(0.549719702439636, 9);
    expect(kpss(nhtemp, true, 10)).toBeCloseTo(0.08811948498730317, 9);
  });

  it("takes the lags that the modified AIC of Ng & Perron has least, by regressions in R", async () => {
    for (const dataset of ["Nile", "nhtemp", "lh", "BJsales", "LakeHuron"]) {
      const [lags] = await r.evaluate(
        `x <- resid(lm(as.numeric(${dataset}) ~ 1)); n <- length(x); K <- trunc(12 * (n / 100)^0.25)
         rows <- (K + 2):n; d <- c(NA, diff(x))
         score <- sapply(0:K, function(k) {
           X <- cbind(x[rows - 1], if (k > 0) sapply(1:k, function(i) d[rows - i]))
           f <- lm(d[rows] ~ 0 + X); s <- mean(resid(f)^2)
           log(s) + 2 * (coef(f)[1]^2 * sum(x[rows - 1]^2) / s + k) / length(rows) })
         which.min(score) - 1`,
      );
      const values = await r.evaluate(dataset);
      expect(unitRootTest(values, { kind: "dickey-fuller-gls", trend: false }).lags).toBe(lags);
    }
  });

  it("gives KPSS the table of 1992 and says where its p-value ends", async () => {
    const test = unitRootTest(await r.evaluate("Nile"), { kind: "kpss", trend: false });
    expect(test.criticalValues).toEqual([
      { significance: 0.1, value: 0.347 },
      { significance: 0.05, value: 0.463 },
      { significance: 0.025, value: 0.574 },
      { significance: 0.01, value: 0.739 },
    ]);
    expect(test.lags).toBe(12);
    // Linear between 0.463 (5 %) and 0.574 (2.5 %).
    expect(test.pValue).toBeCloseTo(0.05 - (0.025 * (0.549719702439636 - 0.463)) / (0.574 - 0.463), 9);
  });

  it("has DF-GLS critical values near the printed ones", () => {
    // Elliott, Rothenberg & Stock (1996), table I.C, with a trend: n = 50, 100, 200 and infinite at 5 %.
    for (const [n, value] of [
      [100, -3.03],
      [200, -2.93],
      [Number.POSITIVE_INFINITY, -2.89],
    ]) {
      expect(Math.abs(dickeyFullerGlsCriticalValues(true, n)[1].value - value)).toBeLessThan(0.06);
    }
    // With a constant it is the Dickey–Fuller distribution without terms: −1.9393 at 5 % (MacKinnon 1991).
    const [, five] = dickeyFullerGlsCriticalValues(false, Number.POSITIVE_INFINITY);
    expect(Math.abs(five.value + 1.9393)).toBeLessThan(0.005);
    // Published p-value surfaces of this distribution differ from each other by up to 0.003.
    expect(
      Math.abs(dickeyFullerGlsPValue(false, -1.9393) - dickeyFullerPValue("none", -1.9393)),
    ).toBeLessThan(0.003);
  });

  it("refuses gaps, short and constant series", () => {
    const test = (values: number[]) => () =>
      unitRootTest(values, { kind: "dickey-fuller-gls", trend: false });
    expect(test([1, 2, Number.NaN, 4, 5, 6, 7, 8])).toThrow(/gaps/);
    expect(test([1, 2, 3])).toThrow(/at least 8/);
    expect(test(new Array(20).fill(3))).toThrow(/vary/);
  });
});

describe("shockFading", () => {
  it("says fades, permanent or that the data cannot tell", async () => {
    expect(shockFading(await r.evaluate("lh"), { trend: false }).verdict).toBe("fades");
    expect(shockFading(await r.evaluate("BJsales"), { trend: false }).verdict).toBe("permanent");
    const short = shockFading(simulate([0.95], 40, 11), { trend: false });
    expect(short).toMatchObject({ verdict: "cannot-tell", reason: "too-little-data" });
  });

  it("takes a change of level for evidence that conflicts: Nile fell in 1899", async () => {
    expect(shockFading(await r.evaluate("Nile"), { trend: false })).toMatchObject({
      verdict: "cannot-tell",
      reason: "evidence-conflicts",
    });
  });

  it("seldom calls fading shocks permanent or permanent ones fading", () => {
    let wrong = 0;
    for (let seed = 1; seed <= 40; seed++) {
      if (shockFading(simulate([0.6], 120, seed), { trend: false }).verdict === "permanent") wrong++;
      if (shockFading(simulate([1], 120, seed), { trend: false }).verdict === "fades") wrong++;
    }
    // Tests at 5 %, two of them one way and one the other: about a tenth of 80 at most.
    expect(wrong).toBeLessThanOrEqual(12);
  });
});
