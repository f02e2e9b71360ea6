import { ArnFormat, RemovalPolicy, Stack } from "aws-cdk-lib";
import { Policy, PolicyStatement, Role, ServicePrincipal } from "aws-cdk-lib/aws-iam";
import type { IFunction } from "aws-cdk-lib/aws-lambda";
import { LogGroup, type RetentionDays } from "aws-cdk-lib/aws-logs";
import { DefinitionBody, LogLevel, StateMachine } from "aws-cdk-lib/aws-stepfunctions";
import { Construct } from "constructs";
import { acknowledgeWildcards } from "./acknowledge.ts";
import { fleetDefinition } from "./fleetDefinition.ts";
import type { CheckedOptions } from "./options.ts";
import { keyStatements, type StoreLocation } from "./storeAccess.ts";

export interface FleetProps {
  readonly store: StoreLocation;
  readonly portion: IFunction;
  readonly closing: IFunction;
  readonly options: CheckedOptions;
}

/**
 * The state machine of the fleet, with a role that reads the portions and writes the workers' answers of a run,
 * invokes the two functions, and nothing else of the bucket.
 */
export class Fleet extends Construct {
  readonly stateMachine: StateMachine;

  constructor(scope: Construct, id: string, props: FleetProps) {
    super(scope, id);
    const { store, portion, closing, options } = props;
    const stack = Stack.of(this);
    const role = new Role(this, "Role", { assumedBy: new ServicePrincipal("states.amazonaws.com") });
    const statements = fleetStatements(props);
    for (const statement of statements) role.addToPolicy(statement);
    const definition = fleetDefinition({
      partition: stack.partition,
      bucketName: store.bucket.bucketName,
      portionFunctionArn: portion.functionArn,
      closingFunctionArn: closing.functionArn,
      concurrency: options.fleetConcurrency,
      toleratedFailurePercentage: options.toleratedFailurePercentage,
    });
    this.stateMachine = new StateMachine(this, "StateMachine", {
      comment: "ebbwire fleet",
      definitionBody: DefinitionBody.fromString(stack.toJsonString(definition)),
      role,
      tracingEnabled: true,
      logs: {
        destination: new LogGroup(this, "Logs", {
          // Step Functions keeps a policy for each log group it writes to; this prefix needs none.
          logGroupName: `/aws/vendedlogs/states/${stack.stackName}-${this.node.addr.slice(-8)}`,
          retention: options.logRetentionDays as RetentionDays,
          removalPolicy: RemovalPolicy.DESTROY,
        }),
        level: LogLevel.ALL,
        includeExecutionData: false,
      },
    });
    // A policy of its own, since the machine waits for its role's policies and this one names the machine.
    const executions = (name: string) =>
      stack.formatArn({
        service: "states",
        resource: "execution",
        arnFormat: ArnFormat.COLON_RESOURCE_NAME,
        resourceName: `${this.stateMachine.stateMachineName}${name}:*`,
      });
    const policy = new Policy(this, "MapPolicy", {
      roles: [role],
      statements: [
        new PolicyStatement({
          actions: ["states:StartExecution"],
          resources: [this.stateMachine.stateMachineArn],
        }),
        new PolicyStatement({
          actions: ["states:DescribeExecution", "states:StopExecution", "states:RedriveExecution"],
          resources: [executions(""), executions("/Portions")],
        }),
      ],
    });
    acknowledgeWildcards(
      policy,
      [executions(""), executions("/Portions")],
      "Executions of this one state machine: their names are made at run time.",
    );
    acknowledgeWildcards(
      role,
      statements.flatMap(({ resources }) => resources),
      "The portions and the workers' answers of a run: its instant is known at run time only.",
    );
    acknowledgeWildcards(
      role,
      ["*"],
      "Log delivery and X-Ray know no resource to name: Step Functions' own guide asks for these actions on all.",
    );
  }
}

function fleetStatements({ store, portion, closing }: FleetProps): PolicyStatement[] {
  const objects = (pattern: string) => store.bucket.arnForObjects(`${store.prefix}runs/*/${pattern}`);
  return [
    new PolicyStatement({ actions: ["s3:GetObject"], resources: [objects("portions.json")] }),
    // What a ResultWriter needs according to the developer guide, "IAM policies for using Distributed Map states".
    new PolicyStatement({
      actions: ["s3:GetObject", "s3:PutObject", "s3:ListMultipartUploadParts", "s3:AbortMultipartUpload"],
      resources: [objects("fleet/*")],
    }),
    new PolicyStatement({
      actions: ["lambda:InvokeFunction"],
      resources: [portion.functionArn, closing.functionArn],
    }),
    ...keyStatements(store),
  ];
}
