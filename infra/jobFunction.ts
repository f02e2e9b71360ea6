import { join } from "node:path";
import { Duration, RemovalPolicy } from "aws-cdk-lib";
import { PolicyStatement, Role, ServicePrincipal } from "aws-cdk-lib/aws-iam";
import { Architecture, type CfnFunction, LoggingFormat, Runtime, Tracing } from "aws-cdk-lib/aws-lambda";
import { NodejsFunction, OutputFormat } from "aws-cdk-lib/aws-lambda-nodejs";
import { LogGroup, type RetentionDays } from "aws-cdk-lib/aws-logs";
import { Construct } from "constructs";
import { acknowledgeWildcards } from "./acknowledge.ts";
import type { CheckedOptions } from "./options.ts";

export interface JobFunctionProps {
  /** File under `functions/` that exports `handler`. */
  readonly file: string;
  readonly description: string;
  readonly root: string;
  readonly options: CheckedOptions;
  readonly environment: Readonly<Record<string, string>>;
  readonly statements: readonly PolicyStatement[];
  readonly reservedConcurrency?: number | undefined;
  /** In MB, where it is not the same as for the others. */
  readonly memory?: number;
}

// esbuild writes ESM; packages written as CommonJS inside it ask for `require` at run time.
const requireBanner =
  "import { createRequire as requireMaker } from 'node:module'; const require = requireMaker(import.meta.url);";

// Lambda gives credentials in the environment; the SDK's other ways to find some are a fifth of the bundle.
const credentialProviders = "@aws-sdk/credential-provider-node";
const lambdaCredentials = "functions/cloud/lambdaCredentials.ts";

// Large, and asked for at run time by few: each a file of its own beside the bundle.
const beside = [
  "@aws-sdk/client-secrets-manager",
  "@aws-sdk/client-sfn",
  "date-holidays",
  "hyparquet",
] as const;

/**
 * One function of the job: Node 24 on arm64, one ESM file with everything in it, a log group of its own with
 * a retention, JSON logs, tracing, and a role that may write to that log group, send traces and do what
 * `statements` say: nothing else.
 *
 * The bundle is minified for the sake of cold starts. There is no source map: it would hold paths that differ from
 * folder to folder, and with them the template would.
 */
export class JobFunction extends Construct {
  readonly function: NodejsFunction;
  readonly logGroup: LogGroup;

  constructor(scope: Construct, id: string, props: JobFunctionProps) {
    super(scope, id);
    const { options } = props;
    this.logGroup = new LogGroup(this, "Logs", {
      retention: options.logRetentionDays as RetentionDays,
      removalPolicy: RemovalPolicy.DESTROY,
    });
    const role = new Role(this, "Role", { assumedBy: new ServicePrincipal("lambda.amazonaws.com") });
    for (const statement of [...this.#runtimeStatements(options), ...props.statements])
      role.addToPrincipalPolicy(statement);
    this.function = new NodejsFunction(this, "Function", {
      description: props.description,
      entry: join(props.root, "functions", props.file),
      handler: "handler",
      projectRoot: props.root,
      depsLockFilePath: join(props.root, "package-lock.json"),
      runtime: Runtime.NODEJS_24_X,
      architecture: Architecture.ARM_64,
      memorySize: props.memory ?? options.memory,
      timeout: Duration.minutes(options.timeoutMinutes),
      role,
      ...(props.reservedConcurrency === undefined
        ? {}
        : { reservedConcurrentExecutions: props.reservedConcurrency }),
      tracing: Tracing.ACTIVE,
      logGroup: this.logGroup,
      loggingFormat: LoggingFormat.JSON,
      environment: { ...props.environment },
      bundling: {
        format: OutputFormat.ESM,
        mainFields: ["module", "main"],
        target: "node24",
        bundleAwsSDK: true,
        banner: requireBanner,
        externalModules: [...beside],
        commandHooks: {
          beforeInstall: () => [],
          beforeBundling: () => [],
          afterBundling: (inputFolder, outputFolder) => [
            `node "${join(inputFolder, "infra", "bundleBeside.mjs")}" "${outputFolder}" ${beside.join(" ")}`,
          ],
        },
        minify: true,
        esbuildArgs: {
          "--legal-comments": "none",
          [`--alias:${credentialProviders}`]: `./${lambdaCredentials}`,
        },
        forceDockerBundling: false,
      },
    });
    if (options.subnetIds !== undefined && options.securityGroupIds !== undefined)
      // By their ids alone: a VPC construct would have to look the rest up.
      (this.function.node.defaultChild as CfnFunction).vpcConfig = {
        subnetIds: options.subnetIds,
        securityGroupIds: options.securityGroupIds,
      };
    this.#acknowledge(options, props.statements);
  }

  #runtimeStatements(options: CheckedOptions): PolicyStatement[] {
    const statements = [
      new PolicyStatement({
        actions: ["logs:CreateLogStream", "logs:PutLogEvents"],
        resources: [this.logGroup.logGroupArn],
      }),
      new PolicyStatement({
        actions: ["xray:PutTraceSegments", "xray:PutTelemetryRecords"],
        resources: ["*"],
      }),
    ];
    if (options.subnetIds !== undefined)
      statements.push(
        new PolicyStatement({
          actions: [
            "ec2:CreateNetworkInterface",
            "ec2:DescribeNetworkInterfaces",
            "ec2:DescribeSubnets",
            "ec2:DeleteNetworkInterface",
            "ec2:AssignPrivateIpAddresses",
            "ec2:UnassignPrivateIpAddresses",
          ],
          resources: ["*"],
        }),
      );
    return statements;
  }

  #acknowledge(options: CheckedOptions, statements: readonly PolicyStatement[]): void {
    const network = options.subnetIds === undefined ? "" : " and Lambda's network interfaces";
    acknowledgeWildcards(
      this,
      ["*"],
      `The actions of X-Ray${network} take no resource: the service authorization reference lists none for them.`,
    );
    acknowledgeWildcards(
      this,
      statements.flatMap(({ resources }) => resources),
      "Below a fixed prefix of the store the names of tables and runs are known at run time only.",
    );
  }
}
