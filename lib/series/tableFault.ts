import type { Problem } from "./series.ts";

/** A table that cannot be read at all; caught where reading began. */
export class TableFault extends Error {
  override readonly name = "TableFault";
  readonly problem: Problem;
  constructor(problem: Problem) {
    super(problem.message);
    this.problem = problem;
  }
}
