import { Duration } from "aws-cdk-lib";
import { PolicyStatement } from "aws-cdk-lib/aws-iam";
import { SqsDestination } from "aws-cdk-lib/aws-lambda-destinations";
import type { NodejsFunction } from "aws-cdk-lib/aws-lambda-nodejs";
import type { ISecret } from "aws-cdk-lib/aws-secretsmanager";
import type { IQueue } from "aws-cdk-lib/aws-sqs";
import type { StateMachine } from "aws-cdk-lib/aws-stepfunctions";
import type { Construct } from "constructs";
import { Fleet } from "./fleet.ts";
import { JobFunction } from "./jobFunction.ts";
import type { CheckedOptions } from "./options.ts";
import { type StoreLocation, type StoreRights, storeStatements } from "./storeAccess.ts";

export interface JobFunctionsProps {
  readonly root: string;
  readonly options: CheckedOptions;
  readonly store: StoreLocation;
  readonly secret: ISecret;
  readonly deadLetters: IQueue;
  readonly deployment: string;
}

export interface JobFunctions {
  readonly scheduled: NodejsFunction;
  /** The fleet's functions and machine, where the deployment has one. */
  readonly fleet:
    | { readonly portion: NodejsFunction; readonly closing: NodejsFunction; readonly machine: StateMachine }
    | undefined;
}

// What each function does in the store. A repeated create reads what stands, so whatever is written may be read.
const planning: StoreRights = {
  read: ["settings.json", "events/", "runs/"],
  write: ["runs/"],
  list: ["series/"],
};
const refitting: StoreRights = {
  read: ["settings.json", "events/", "series/", "models/", "forecasts/", "runs/"],
  write: ["models/", "forecasts/", "runs/"],
  list: [],
};
const closing: StoreRights = {
  read: ["settings.json", "events/", "models/", "runs/"],
  write: ["runs/"],
  list: ["series/"],
};

/**
 * The functions of a deployment, each with the rights its own work needs: planning lists the tables, refitting reads
 * them and writes documents, closing writes messages and reads the webhook secret. One function that does all has
 * the sum of them.
 */
export function jobFunctions(scope: Construct, props: JobFunctionsProps): JobFunctions {
  const { root, options, store, secret, deadLetters } = props;
  const environment = {
    EBBWIRE_STORE: `s3://${store.bucket.bucketName}${options.prefix === undefined ? "" : `/${options.prefix}`}`,
    EBBWIRE_DEPLOYMENT: props.deployment,
  };
  const withSecret = { ...environment, EBBWIRE_SECRET: secret.secretArn };
  const readSecret = new PolicyStatement({
    actions: ["secretsmanager:GetSecretValue"],
    resources: [secret.secretArn],
  });

  const fleet = options.fleet === "never" ? undefined : makeFleet();
  const alone = options.fleet !== "always";
  const { function: scheduled } = new JobFunction(scope, "Scheduled", {
    file: "scheduled.ts",
    description: "ebbwire: a run on schedule, by itself or handed to the fleet",
    root,
    options,
    reservedConcurrency: fleet === undefined ? options.reservedConcurrency : undefined,
    environment: {
      ...(alone ? withSecret : environment),
      ...(fleet === undefined
        ? {}
        : { EBBWIRE_STATE_MACHINE: fleet.machine.stateMachineArn, EBBWIRE_FLEET: options.fleet }),
    },
    statements: [
      ...storeStatements(store, alone ? refitting : planning),
      ...(alone ? [readSecret] : []),
      ...(fleet === undefined
        ? []
        : [
            new PolicyStatement({
              actions: ["states:StartExecution"],
              resources: [fleet.machine.stateMachineArn],
            }),
          ]),
    ],
  });
  scheduled.configureAsyncInvoke({
    retryAttempts: 2,
    maxEventAge: Duration.hours(1),
    onFailure: new SqsDestination(deadLetters),
  });
  return { scheduled, fleet };

  function makeFleet() {
    const portion = new JobFunction(scope, "Portion", {
      file: "portion.ts",
      description: "ebbwire: one worker of the fleet",
      root,
      options,
      reservedConcurrency: options.reservedConcurrency,
      environment,
      statements: storeStatements(store, refitting),
    });
    const closer = new JobFunction(scope, "Closing", {
      file: "closing.ts",
      description: "ebbwire: closes a fleet's run and delivers its messages",
      root,
      options,
      memory: Math.max(options.memory, options.closingMemory),
      environment: withSecret,
      statements: [...storeStatements(store, closing), readSecret],
    });
    const functions = { portion: portion.function, closing: closer.function };
    const { stateMachine: machine } = new Fleet(scope, "Fleet", { store, options, ...functions });
    return { ...functions, machine };
  }
}
