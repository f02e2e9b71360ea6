/** What to do about a store without a table; `check` and `run` say it in the same words. */
export const noTablesText = (address: string) =>
  `There are no tables in ${address} yet: put CSV files under series/, such as series/loans.csv.`;

/** The store holds no table, and the last run knew of none: there is nothing to plan, and nothing was written. */
export class NoTablesError extends Error {
  override readonly name = "NoTablesError";
  constructor(address: string) {
    super(noTablesText(address));
  }
}
