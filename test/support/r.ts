import { afterAll, beforeAll } from "vitest";
import { type RDouble, WebR } from "webr";

/** R itself (the `webr` package), for checks against R's own functions. */
export interface RSession {
  /** Value of an R expression as numbers; `NA` comes back as `NaN`. Logical values become 0 and 1. */
  evaluate(code: string): Promise<number[]>;
  /** Puts numbers into R under a name; `NaN` becomes `NA`. */
  assign(name: string, values: ArrayLike<number>): Promise<void>;
}

/** Starts one R for the test file that calls it, and ends it after the file's last test. */
export function withR(): RSession {
  const session = new WebR();
  beforeAll(() => session.init());
  afterAll(() => session.close());
  return sessionOf(session);
}

/** The same for scripts, which start and end R themselves. */
export async function startR(): Promise<RSession & { end(): void }> {
  const session = new WebR();
  await session.init();
  return { ...sessionOf(session), end: () => session.close() };
}

function sessionOf(session: WebR): RSession {
  const evaluate = async (code: string): Promise<number[]> => {
    const answer = (await session.evalR(`as.numeric({ ${code} })`)) as RDouble;
    const numbers = Array.from(await answer.toTypedArray());
    await session.destroy(answer);
    return numbers;
  };
  return {
    evaluate,
    assign: async (name, values) => {
      const literals = Array.from(values, (value) => (Number.isNaN(value) ? "NA" : literal(value)));
      await session.evalRVoid(`${name} <- as.numeric(c(${literals.join(",")}))`);
    },
  };
}

function literal(value: number): string {
  if (value === Number.POSITIVE_INFINITY) return "Inf";
  if (value === Number.NEGATIVE_INFINITY) return "-Inf";
  return String(value);
}
