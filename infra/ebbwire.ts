import { Duration, Stack, Tags, Validations } from "aws-cdk-lib";
import type { Alarm } from "aws-cdk-lib/aws-cloudwatch";
import { PolicyStatement, ServicePrincipal } from "aws-cdk-lib/aws-iam";
import type { NodejsFunction } from "aws-cdk-lib/aws-lambda-nodejs";
import type { IBucket } from "aws-cdk-lib/aws-s3";
import { ContextAttribute } from "aws-cdk-lib/aws-scheduler";
import { Secret } from "aws-cdk-lib/aws-secretsmanager";
import { type ITopic, Topic } from "aws-cdk-lib/aws-sns";
import { EmailSubscription } from "aws-cdk-lib/aws-sns-subscriptions";
import { Queue, QueueEncryption } from "aws-cdk-lib/aws-sqs";
import type { StateMachine } from "aws-cdk-lib/aws-stepfunctions";
import { Construct } from "constructs";
import { Alarms } from "./alarms.ts";
import { jobDashboard } from "./dashboard.ts";
import { jobFunctions } from "./jobFunctions.ts";
import { jobSchedule, schedulerRole } from "./jobSchedule.ts";
import { type CheckedOptions, checkOptions, type Options } from "./options.ts";
import { projectRoot } from "./projectRoot.ts";
import { longestGapHours } from "./schedulePeriod.ts";
import { storeLocation } from "./storeBucket.ts";

/** Choices of a deployment, all optional; `infra/options.ts` says what each may be. */
export interface EbbwireProps extends Omit<Options, "stackName"> {
  /** The folder of the ebbwire project; found by itself where it stands above, or is installed beside. */
  readonly projectRoot?: string;
}

/**
 * Everything ebbwire needs in an account, to put into an app of one's own: the store, the scheduled function, the
 * fleet for when one function is too small, the webhook secret, the dead-letter queue, alarms and a dashboard.
 *
 * The store and what is in it outlive the stack. Nothing is looked up, so synthesis works offline.
 *
 * @throws {ChoiceError} naming every choice that cannot be used
 * @example
 * const ebbwire = new Ebbwire(this, "Forecasts", { schedule: "rate(1 day)", timeZone: "Europe/Lisbon", fleet: "never" });
 * new BucketDeployment(this, "Tables", { destinationBucket: ebbwire.bucket, destinationKeyPrefix: "series", ... });
 */
export class Ebbwire extends Construct {
  /** Holds `series/`, `settings.json` and everything the job writes, below the prefix where one is chosen. */
  readonly bucket: IBucket;
  /** Invoke it with `{ "asOf": "now" }` for a run outside the schedule. */
  readonly scheduledFunction: NodejsFunction;
  /** A JSON object of names to webhook addresses and signing keys, to be put after the first deploy. */
  readonly webhookSecret: Secret;
  /** Events of runs that were given up. */
  readonly deadLetters: Queue;
  /** The fleet, unless `fleet` is "never". */
  readonly stateMachine: StateMachine | undefined;
  readonly alarms: readonly Alarm[];

  constructor(scope: Construct, id: string, props: EbbwireProps = {}) {
    super(scope, id);
    const { projectRoot: givenRoot, ...choices } = props;
    const options = checkOptions(choices);
    const store = storeLocation(this, options);
    const deployment = this.node.path;
    this.bucket = store.bucket;
    this.webhookSecret = this.#secret();
    this.deadLetters = this.#queue();
    const { scheduled, fleet } = jobFunctions(this, {
      root: givenRoot ?? projectRoot(),
      options,
      store,
      secret: this.webhookSecret,
      deadLetters: this.deadLetters,
      deployment,
    });
    this.scheduledFunction = scheduled;
    this.stateMachine = fleet?.machine;
    const gapHours = longestGapHours(options.schedule);
    const watchEvery = Duration.hours(gapHours < 24 ? 1 : 6);
    const runWithinHours = 2 * gapHours;
    this.#schedules(options, watchEvery, runWithinHours);
    const functions = fleet === undefined ? [scheduled] : [scheduled, fleet.portion, fleet.closing];
    const { all } = new Alarms(this, "Alarms", {
      functions,
      stateMachine: this.stateMachine,
      deadLetters: this.deadLetters,
      deployment,
      timeout: Duration.minutes(options.timeoutMinutes),
      watchEvery,
      runWithinHours,
      topic: this.#topic(options),
    });
    this.alarms = all;
    if (options.dashboard)
      jobDashboard(this, { deployment, alarms: all, functions, storeName: store.bucket.bucketName });
    Tags.of(this).add("application", "ebbwire");
    if (options.costCenter !== undefined) Tags.of(this).add("cost-center", options.costCenter);
  }

  #schedules(options: CheckedOptions, watchEvery: Duration, withinHours: number): void {
    const target = { function: this.scheduledFunction, deadLetters: this.deadLetters };
    const role = schedulerRole(this, this.scheduledFunction, this.deadLetters);
    jobSchedule(this, "Schedule", role, {
      ...target,
      expression: options.schedule,
      timeZone: options.timeZone,
      description: "Starts a run of ebbwire",
      // The time it was due, the same in every retry: it names the run.
      input: { asOf: ContextAttribute.scheduledTime },
    });
    jobSchedule(this, "WatchSchedule", role, {
      ...target,
      expression: `rate(${watchEvery.toHours()} ${watchEvery.toHours() === 1 ? "hour" : "hours"})`,
      timeZone: "UTC",
      description: "Lets ebbwire tell how long ago its newest run was",
      input: { watch: { withinHours } },
    });
  }

  #secret(): Secret {
    const secret = new Secret(this, "Webhooks", {
      description: "Webhook addresses and signing keys of ebbwire: a JSON object of names to values",
    });
    Validations.of(secret).acknowledge({
      id: "AwsSolutions-SMG4",
      reason: "It holds addresses that a chat service gives out: only a person can have new ones made there.",
    });
    return secret;
  }

  #queue(): Queue {
    const queue = new Queue(this, "DeadLetters", {
      encryption: QueueEncryption.SQS_MANAGED,
      enforceSSL: true,
      retentionPeriod: Duration.days(14),
    });
    Validations.of(queue).acknowledge({
      id: "AwsSolutions-SQS3",
      reason: "This queue is itself the dead-letter queue.",
    });
    return queue;
  }

  #topic(options: CheckedOptions): ITopic | undefined {
    if (options.alarmTopicArn !== undefined)
      return Topic.fromTopicArn(this, "AlarmTopic", options.alarmTopicArn);
    if (options.alarmEmail === undefined) return undefined;
    const topic = new Topic(this, "AlarmTopic", {
      displayName: `ebbwire alarms of ${Stack.of(this).stackName}`,
      enforceSSL: true,
    });
    topic.addSubscription(new EmailSubscription(options.alarmEmail));
    // A topic with a policy of its own has lost the default one, which lets alarms of the account publish.
    topic.addToResourcePolicy(
      new PolicyStatement({
        principals: [new ServicePrincipal("cloudwatch.amazonaws.com")],
        actions: ["sns:Publish"],
        resources: [topic.topicArn],
        conditions: { StringEquals: { "aws:SourceAccount": Stack.of(this).account } },
      }),
    );
    return topic;
  }
}
