/** How far a long piece of work is. */
export type Progress =
  | { readonly stage: "table"; readonly table: string; readonly done: number; readonly of: number }
  | { readonly stage: "run"; readonly asOf: string; readonly done: number; readonly of: number };
