import { describe, expect, it } from "vitest";
import { burgWorkspace } from "../../lib/autoregression/burg.ts";
import type { Preparation } from "../../lib/forecast/candidates.ts";
import {
  errorVariances,
  fitMember,
  forecastMember,
  type MemberFit,
  shockResponse,
} from "../../lib/forecast/memberFit.ts";
import { withR } from "../support/r.ts";

const r = withR();
const HORIZON = 14;
const PLAIN = { season: 0, profile: "none", line: false, drifts: ["none", "whole"] } as const;

function fitted(values: readonly number[], preparation: Preparation): MemberFit {
  const series = Float64Array.from(values);
  const fit = fitMember(series, series.length, preparation, 6, burgWorkspace(series.length, 6));
  if (fit === undefined) throw new Error("no fit");
  return fit;
}

function path(fit: MemberFit, drift: "none" | "whole"): Float64Array {
  const out = new Float64Array(HORIZON);
  forecastMember(fit, drift, fit.count, HORIZON, out, 0);
  return out;
}

/** R's forecast and standard errors over sigma of the same coefficients held fixed. */
async function inR(name: string, fit: MemberFit, orders: string, extra = ""): Promise<number[][]> {
  const coefficients = `c(${Array.from(fit.model.coefficients).join(",")}${extra})`;
  const model = `arima(${name}, ${orders}, fixed=${coefficients}, transform.pars=FALSE, method="ML")`;
  const code = `{ m <- ${model}; p <- predict(m, ${HORIZON}); c(p$pred, p$se/sqrt(m$sigma2)) }`;
  const both = await r.evaluate(code);
  return [both.slice(0, HORIZON), both.slice(HORIZON)];
}

function expectClose(got: ArrayLike<number>, expected: readonly number[], tolerance: number): void {
  expected.forEach((value, h) => {
    expect(Math.abs(got[h] - value)).toBeLessThan(tolerance * (1 + Math.abs(value)));
  });
}

describe("fitMember", () => {
  it("forecasts first differences as R's arima(p,1,0) of the same coefficients", async () => {
    const values = await r.evaluate("LakeHuron");
    const fit = fitted(values, { ...PLAIN, differences: [1] });
    const p = fit.model.coefficients.length;
    const [forecast, errors] = await inR("LakeHuron", fit, `order=c(${p},1,0)`);
    expectClose(path(fit, "none"), forecast, 1e-8);
    const variance = fit.model.innovationVariance;
    expectClose(
      errorVariances(fit, "none", HORIZON).map((one) => Math.sqrt(one / variance)),
      errors,
      1e-6,
    );
  });

  it("forecasts seasonal differences as R's seasonal arima of the same coefficients", async () => {
    const values = await r.evaluate("log(UKgas)");
    const fit = fitted(values, { ...PLAIN, differences: [4] });
    const p = fit.model.coefficients.length;
    const orders = `order=c(${p},0,0), seasonal=list(order=c(0,1,0), period=4)`;
    const [forecast, errors] = await inR("log(UKgas)", fit, orders);
    expectClose(path(fit, "none"), forecast, 1e-8);
    const variance = fit.model.innovationVariance;
    expectClose(
      errorVariances(fit, "none", HORIZON).map((one) => Math.sqrt(one / variance)),
      errors,
      1e-6,
    );
  });

  it("forecasts levels about their mean as R's arima(p,0,0) with that mean", async () => {
    const values = await r.evaluate("lh");
    const fit = fitted(values, { ...PLAIN, differences: [], drifts: ["whole"] });
    const p = fit.model.coefficients.length;
    const [forecast] = await inR("lh", fit, `order=c(${p},0,0)`, `,${fit.wholeMean}`);
    expectClose(path(fit, "whole"), forecast, 1e-8);
  });

  it("goes on along a straight line that it was given, with and without differences", () => {
    const line = Array.from({ length: 40 }, (_, t) => 5 + 0.5 * t);
    const ahead = Array.from({ length: HORIZON }, (_, h) => 5 + 0.5 * (40 + h));
    expectClose(path(fitted(line, { ...PLAIN, differences: [1] }), "whole"), ahead, 1e-9);
    expectClose(path(fitted(line, { ...PLAIN, differences: [], line: true }), "whole"), ahead, 1e-9);
    expectClose(path(fitted(line, { ...PLAIN, differences: [1, 1] }), "none"), ahead, 1e-9);
  });

  it("forecasts from a later origin with an earlier fit as it would have then", () => {
    const values = Float64Array.from({ length: 60 }, (_, t) => Math.sin(t) + 0.1 * ((t * 7) % 5));
    const preparation = { ...PLAIN, differences: [1] };
    const whole = fitMember(values, 40, preparation, 6, burgWorkspace(60, 6));
    const known = fitMember(values.slice(0, 50), 40, preparation, 6, burgWorkspace(60, 6));
    if (whole === undefined || known === undefined) throw new Error("no fit");
    const [later, then] = [new Float64Array(5), new Float64Array(5)];
    forecastMember(whole, "whole", 50, 5, later, 0);
    forecastMember(known, "whole", 50, 5, then, 0);
    expect([...later]).toEqual([...then]);
  });

  it("responds to a shock by the moving-average weights passed through the differences", async () => {
    const values = await r.evaluate("LakeHuron");
    const fit = fitted(values, { ...PLAIN, differences: [1] });
    const weights = await r.evaluate(
      `c(1, ARMAtoMA(c(${Array.from(fit.model.coefficients).join(",")}), lag.max=${HORIZON - 1}))`,
    );
    let sum = 0;
    expectClose(
      shockResponse(fit, HORIZON),
      weights.map((weight) => {
        sum += weight;
        return sum;
      }),
      1e-12,
    );
  });

  it("adds what an unknown drift costs: its variance times the square of the steps", () => {
    // White differences of variance v over n values: h·v for the shocks and h²·v/n for the mean of the differences.
    const steps = Array.from({ length: 64 }, (_, t) => ((t * 29) % 64) - 31.5);
    const values = [0];
    for (const step of steps) values.push(values[values.length - 1] + step);
    const series = Float64Array.from(values);
    const fit = fitMember(series, series.length, { ...PLAIN, differences: [1] }, 0, burgWorkspace(65, 1));
    if (fit === undefined) throw new Error("no fit");
    const variance = fit.model.innovationVariance;
    errorVariances(fit, "whole", 5).forEach((one, h) => {
      expect(one / variance).toBeCloseTo(h + 1 + (h + 1) ** 2 / 64, 10);
    });
  });
});
