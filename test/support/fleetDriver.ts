import type { Invocation } from "./lambdaRuntime.ts";

// biome-ignore lint/suspicious/noExplicitAny: the definition is read as the JSON it is
type Json = any;

export interface FleetServices {
  /** Reads an object for the ItemReader. */
  readonly read: (key: string) => Promise<string>;
  /** Writes an object for the ResultWriter. */
  readonly write: (key: string, text: string) => Promise<void>;
  /** Invokes the function that `Parameters.FunctionName` names; `attempt` is 1 for the first. */
  readonly invoke: (functionName: string, payload: unknown, attempt: number) => Promise<Invocation>;
}

export interface FleetEnd {
  readonly status: "SUCCEEDED" | "FAILED";
  readonly error?: string;
  readonly output?: Json;
  readonly failedPortions: readonly Json[];
  readonly retries: number;
}

/**
 * Drives a fleet's definition over real functions: ItemReader, ItemBatcher, Retry, tolerated failures, ResultWriter,
 * Catch, closing and the choice after it, as the States Language describes them. It reads what it can from the
 * definition, so that a change there changes the test; waiting between tries is left out.
 */
export async function driveFleet(definition: Json, input: Json, services: FleetServices): Promise<FleetEnd> {
  const { Portions: map, Close: close } = definition.States;
  let retries = 0;
  const task = async (state: Json, payload: unknown): Promise<Invocation> => {
    const tried = new Map<object, number>();
    for (let attempt = 1; ; attempt++) {
      const end = await services.invoke(state.Parameters.FunctionName, payload, attempt);
      if (end.error === undefined) return end;
      const { errorType } = end.error;
      const retry = state.Retry.find(({ ErrorEquals }: Json) =>
        ErrorEquals.some((name: string) => name === errorType || name === "States.ALL"),
      );
      const count = tried.get(retry) ?? 0;
      if (retry === undefined || count >= retry.MaxAttempts) return end;
      tried.set(retry, count + 1);
      retries++;
    }
  };

  const items: Json[] = JSON.parse(await services.read(at(input, map.ItemReader.Parameters["Key.$"])));
  const batches = chunks(items, map.ItemBatcher.MaxItemsPerBatch).map((Items) => ({
    BatchInput: filled(map.ItemBatcher.BatchInput, input),
    Items,
  }));
  const worker = map.ItemProcessor.States[map.ItemProcessor.StartAt];
  const ends: Invocation[] = [];
  for (const batch of batches) ends.push(await task(worker, batch));
  const failedPortions = batches.filter((_, index) => ends[index].error);
  await services.write(
    `${at(input, map.ResultWriter.Parameters["Prefix.$"])}/SUCCEEDED_0.json`,
    JSON.stringify(ends.flatMap(({ answer }) => answer ?? [])),
  );
  const exceeded = (100 * failedPortions.length) / batches.length > map.ToleratedFailurePercentage;
  const closed = await task(close, filled(close.Parameters.Payload, input));
  const common = { failedPortions, retries };
  if (closed.error) return { status: "FAILED", error: closed.error.errorType, ...common };
  // The Catch of the Map leaves its mark, and the choice after closing looks for it.
  if (exceeded) {
    const [{ Next }] = definition.States["Was it whole?"].Choices;
    return { status: "FAILED", error: definition.States[Next].Error, output: closed.answer, ...common };
  }
  return { status: "SUCCEEDED", output: closed.answer, ...common };
}

const at = (input: Json, path: string) =>
  path === "$$.Execution.StartTime" ? new Date().toISOString() : input[path.slice("$.".length)];

function filled(template: Json, input: Json): Json {
  return Object.fromEntries(
    Object.entries<string>(template).map(([name, value]) =>
      name.endsWith(".$") ? [name.slice(0, -2), at(input, value)] : [name, value],
    ),
  );
}

function chunks<T>(list: readonly T[], size: number): T[][] {
  const found: T[][] = [];
  for (let from = 0; from < list.length; from += size) found.push(list.slice(from, from + size));
  return found;
}
