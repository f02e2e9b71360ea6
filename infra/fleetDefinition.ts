export interface FleetDefinitionProps {
  readonly partition: string;
  readonly bucketName: string;
  readonly portionFunctionArn: string;
  readonly closingFunctionArn: string;
  /** Workers at a time. */
  readonly concurrency: number;
  /** Share of worker invocations that may fail for good before no more are started. */
  readonly toleratedFailurePercentage: number;
}

/** Faults of the platform, and a worker or closing that ran out of time: worth another try. */
const passingFaults = [
  "UnfinishedError",
  "StoreError",
  "Lambda.ServiceException",
  "Lambda.AWSLambdaException",
  "Lambda.SdkClientException",
  "Lambda.TooManyRequestsException",
  "Sandbox.Timedout",
  "States.Timeout",
];

const retry = [
  {
    ErrorEquals: passingFaults,
    IntervalSeconds: 2,
    BackoffRate: 2,
    MaxDelaySeconds: 120,
    MaxAttempts: 6,
    JitterStrategy: "FULL",
  },
  { ErrorEquals: ["States.ALL"], IntervalSeconds: 5, BackoffRate: 2, MaxAttempts: 1 },
];

/**
 * The fleet as Amazon States Language: a Distributed Map over `runs/<asOf>/portions.json`, then closing.
 *
 * Written out rather than put together from constructs, so that what is deployed can be read here, and because the
 * construct leaves the ResultWriter out unless the app that uses it has a feature flag on (aws-cdk issue 35966).
 *
 * Input: `{ asOf, portionsKey, resultsPrefix, because }`. Each worker gets one portion (the plan cuts them to size)
 * with the run's instant. Workers' answers go below `resultsPrefix`, not through the execution, whose state may
 * hold 256 KB. When more workers fail for good than tolerated the Map stops; closing still sends the one
 * message, which names the tables that are left, and then the execution fails, so that the alarm tells.
 */
export function fleetDefinition(props: FleetDefinitionProps): Readonly<Record<string, unknown>> {
  const invoke = `arn:${props.partition}:states:::lambda:invoke`;
  const closing = {
    "asOf.$": "$.asOf",
    "because.$": "$.because",
    "startedAt.$": "$$.Execution.StartTime",
  };
  return {
    Comment: "ebbwire fleet: every portion of a plan to a worker, then one closing",
    StartAt: "Portions",
    States: {
      Portions: {
        Type: "Map",
        Label: "Portions",
        ItemReader: {
          Resource: `arn:${props.partition}:states:::s3:getObject`,
          ReaderConfig: { InputType: "JSON" },
          Parameters: { Bucket: props.bucketName, "Key.$": "$.portionsKey" },
        },
        ItemBatcher: { MaxItemsPerBatch: 1, BatchInput: { "asOf.$": "$.asOf" } },
        MaxConcurrency: props.concurrency,
        ToleratedFailurePercentage: props.toleratedFailurePercentage,
        ItemProcessor: {
          ProcessorConfig: { Mode: "DISTRIBUTED", ExecutionType: "STANDARD" },
          StartAt: "Refit",
          States: {
            Refit: {
              Type: "Task",
              Resource: invoke,
              Parameters: { FunctionName: props.portionFunctionArn, "Payload.$": "$" },
              OutputPath: "$.Payload",
              Retry: retry,
              End: true,
            },
          },
        },
        ResultWriter: {
          Resource: `arn:${props.partition}:states:::s3:putObject`,
          Parameters: { Bucket: props.bucketName, "Prefix.$": "$.resultsPrefix" },
        },
        ResultPath: "$.portions",
        Catch: [{ ErrorEquals: ["States.ALL"], ResultPath: "$.fault", Next: "Close" }],
        Next: "Close",
      },
      Close: {
        Type: "Task",
        Resource: invoke,
        Parameters: { FunctionName: props.closingFunctionArn, Payload: closing },
        ResultSelector: { "closed.$": "$.Payload" },
        ResultPath: "$.result",
        Retry: retry,
        Next: "Was it whole?",
      },
      "Was it whole?": {
        Type: "Choice",
        Choices: [{ Variable: "$.fault", IsPresent: true, Next: "Too much failed" }],
        Default: "Done",
      },
      "Too much failed": {
        Type: "Fail",
        Error: "TooManyPortionsFailed",
        Cause:
          "More portions failed than are tolerated; the message was sent and names the tables that are left.",
      },
      Done: { Type: "Succeed", OutputPath: "$.result.closed" },
    },
  };
}
