import { CfnOutput, Duration, Stack, Tags } from "aws-cdk-lib";
import { PolicyStatement } from "aws-cdk-lib/aws-iam";
import { SqsDestination } from "aws-cdk-lib/aws-lambda-destinations";
import type { NodejsFunction } from "aws-cdk-lib/aws-lambda-nodejs";
import type { IBucket } from "aws-cdk-lib/aws-s3";
import { ContextAttribute } from "aws-cdk-lib/aws-scheduler";
import { Secret } from "aws-cdk-lib/aws-secretsmanager";
import { Queue, QueueEncryption } from "aws-cdk-lib/aws-sqs";
import { Construct } from "constructs";
import { JobFunction } from "./jobFunction.ts";
import { jobSchedule, schedulerRole } from "./jobSchedule.ts";
import { checkOptions, type Options } from "./options.ts";
import { projectRoot } from "./projectRoot.ts";
import { storeStatements } from "./storeAccess.ts";
import { storeLocation } from "./storeBucket.ts";

export interface EbbwireProps extends Options {
  /** The folder of the ebbwire project; found by itself where the project stands beside or above, or is installed. */
  readonly projectRoot?: string;
}

export class Ebbwire extends Construct {
  readonly bucket: IBucket;
  readonly scheduledFunction: NodejsFunction;
  readonly webhookSecret: Secret;
  readonly deadLetters: Queue;

  constructor(scope: Construct, id: string, props: EbbwireProps = {}) {
    super(scope, id);
    const { projectRoot: givenRoot, ...choices } = props;
    const options = checkOptions(choices);
    const root = givenRoot ?? projectRoot();
    const store = storeLocation(this, options);
    this.bucket = store.bucket;
    this.webhookSecret = new Secret(this, "Webhooks", {
      description: "Webhook addresses and signing keys of ebbwire: a JSON object of names to values",
    });
    this.deadLetters = new Queue(this, "DeadLetters", {
      encryption: QueueEncryption.SQS_MANAGED,
      enforceSSL: true,
      retentionPeriod: Duration.days(14),
    });
    const job = new JobFunction(this, "Scheduled", {
      file: "scheduled.ts",
      description: "ebbwire: refits every table of the store, forecasts, and posts what changed",
      root,
      options,
      environment: {
        EBBWIRE_STORE: `s3://${store.bucket.bucketName}${store.prefix === "" ? "" : `/${options.prefix}`}`,
        EBBWIRE_SECRET: this.webhookSecret.secretArn,
        EBBWIRE_DEPLOYMENT: Stack.of(this).stackName,
      },
      statements: [
        ...storeStatements(store, {
          read: ["settings.json", "series/", "models/", "forecasts/", "runs/"],
          write: ["models/", "forecasts/", "runs/"],
          list: [],
        }),
        new PolicyStatement({
          actions: ["secretsmanager:GetSecretValue"],
          resources: [this.webhookSecret.secretArn],
        }),
      ],
    });
    this.scheduledFunction = job.function;
    job.function.configureAsyncInvoke({
      retryAttempts: 2,
      maxEventAge: Duration.hours(1),
      onFailure: new SqsDestination(this.deadLetters),
    });
    jobSchedule(this, "Schedule", schedulerRole(this, job.function, this.deadLetters), {
      function: job.function,
      deadLetters: this.deadLetters,
      expression: options.schedule,
      timeZone: options.timeZone,
      description: "Starts a run of ebbwire",
      input: { asOf: ContextAttribute.scheduledTime },
    });
    Tags.of(this).add("application", "ebbwire");
    new CfnOutput(this, "StoreBucket", { value: store.bucket.bucketName });
    new CfnOutput(this, "WebhookSecret", { value: this.webhookSecret.secretArn });
  }
}
