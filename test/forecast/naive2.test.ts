import { describe, expect, it } from "vitest";
import { naive2 } from "../../lib/forecast/naive2.ts";
import { withR } from "../support/r.ts";

const r = withR();

/** Naive2 written in R from its own `acf` and `decompose` (Makridakis, Spiliotis and Assimakopoulos 2020). */
const IN_R = `naive2 <- function(x, h) {
  m <- frequency(x); n <- length(x)
  a <- acf(x, lag.max = m, plot = FALSE)$acf[-1]
  seasonal <- m > 1 && n >= 3*m && abs(a[m]) > 1.645*sqrt((1 + 2*sum(a[seq_len(m-1)]^2))/n)
  if (!seasonal) return(rep(x[n], h))
  d <- decompose(x, type = "multiplicative")
  figure <- d$seasonal
  last <- x[n]/figure[n]
  last*figure[n - m + ((seq_len(h) - 1) %% m) + 1]
}`;

describe("naive2", () => {
  it("agrees with R's acf and decompose on monthly, quarterly and unseasonal series", async () => {
    await r.evaluate(`${IN_R}; 0`);
    for (const [name, season] of [
      ["AirPassengers", 12],
      ["JohnsonJohnson", 4],
      ["UKgas", 4],
      ["nottem", 12],
      ["ldeaths", 12],
    ] as const) {
      const values = await r.evaluate(name);
      const expected = await r.evaluate(`naive2(${name}, 18)`);
      naive2(values, season, 18).forEach((value, h) => {
        expect(Math.abs(value / expected[h] - 1), `${name} ${h}`).toBeLessThan(1e-10);
      });
    }
  });

  it("repeats the last value where the season fails the 90 % test", async () => {
    const values = await r.evaluate("set.seed(3); round(rnorm(60, 100, 10), 3)");
    await r.assign("flat", values);
    const [seasonal] = await r.evaluate(
      "a <- acf(flat, 12, plot=FALSE)$acf[-1]; abs(a[12]) > 1.645*sqrt((1+2*sum(a[1:11]^2))/60)",
    );
    expect(seasonal).toBe(0);
    expect([...naive2(values, 12, 3)]).toEqual(Array(3).fill(values[59]));
  });

  it("refuses gaps", () => {
    expect(() => naive2([1, Number.NaN], 1, 2)).toThrow(/values/);
  });
});
