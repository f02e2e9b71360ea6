/** One execution of the fleet's state machine. */
export interface FleetRun {
  /** Unique among executions: made from the run's instant, so that a repeated trigger starts nothing new. */
  readonly name: string;
  readonly input: Readonly<Record<string, string>>;
}

/** Starts an execution; `standing` when one of this name was started before. */
export type StartFleet = (run: FleetRun) => Promise<"started" | "standing">;

/**
 * Starts an execution of the state machine. Step Functions takes the same name with the same input as the same
 * execution while it runs, and says `ExecutionAlreadyExists` once it has ended: both mean that it was started.
 */
export async function startFleet(stateMachineArn: string, run: FleetRun): Promise<"started" | "standing"> {
  const { ExecutionAlreadyExists, SFNClient, StartExecutionCommand } = await import("@aws-sdk/client-sfn");
  const client = new SFNClient({ maxAttempts: 5 });
  try {
    const input = JSON.stringify(run.input);
    await client.send(new StartExecutionCommand({ stateMachineArn, name: run.name, input }));
    return "started";
  } catch (error) {
    if (error instanceof ExecutionAlreadyExists) return "standing";
    throw error;
  } finally {
    client.destroy();
  }
}
