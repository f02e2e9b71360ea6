import validateDefinition from "asl-validator";
import { describe, expect, it } from "vitest";
import { fleetDefinition } from "../../infra/fleetDefinition.ts";
import { policiesOf, textOf } from "./policies.ts";
import { resourcesOf, templateOf } from "./synthesise.ts";

const template = templateOf({ prefix: "team", fleetConcurrency: 25, toleratedFailurePercentage: 20 });
const [[, machine]] = resourcesOf(template, "AWS::StepFunctions::StateMachine");
const definition = JSON.parse(textOf(machine.Properties.DefinitionString));
const map = definition.States.Portions;

/** A copy with a real partition, for the validator, which checks ARNs and fills in defaults where it reads. */
const sound = () => JSON.parse(JSON.stringify(definition).replaceAll("<AWS::Partition>", "aws"));

describe("the fleet's state machine", () => {
  it("is sound Amazon States Language", () => {
    const { isValid, errorsText } = validateDefinition(sound());
    expect(errorsText()).toBe("");
    expect(isValid).toBe(true);
  });

  it("would not pass that check with a state that leads nowhere", () => {
    const spoilt = sound();
    spoilt.States.Close.Next = "Nowhere";
    expect(validateDefinition(spoilt).isValid).toBe(false);
  });

  it("has only fields that the States Language knows for a Distributed Map", () => {
    // Field names of the Map state: states-language.net and the Step Functions guide, "Distributed Map state".
    // The validator lets unknown fields pass, so they are held to the list here.
    const known =
      /^(Type|Label|ItemReader|ItemBatcher|MaxConcurrency|ToleratedFailurePercentage|ItemProcessor|ResultWriter|ResultPath|Catch|Next)$/;
    for (const field of Object.keys(map)) expect(field).toMatch(known);
    expect(Object.keys(map.ItemReader).sort()).toEqual(["Parameters", "ReaderConfig", "Resource"]);
    expect(Object.keys(map.ItemProcessor).sort()).toEqual(["ProcessorConfig", "StartAt", "States"]);
  });

  it("reads the portions of the run from the store, as a JSON array", () => {
    expect(map.ItemReader).toEqual({
      Resource: "arn:<AWS::Partition>:states:::s3:getObject",
      ReaderConfig: { InputType: "JSON" },
      Parameters: { Bucket: expect.stringMatching(/^<EbbwireStore/), "Key.$": "$.portionsKey" },
    });
  });

  it("hands each worker one portion with the run's instant", () => {
    expect(map.ItemBatcher).toEqual({ MaxItemsPerBatch: 1, BatchInput: { "asOf.$": "$.asOf" } });
    expect(map.ItemProcessor.ProcessorConfig).toEqual({ Mode: "DISTRIBUTED", ExecutionType: "STANDARD" });
    expect(map.ItemProcessor.States.Refit.Parameters).toEqual({
      FunctionName: expect.stringMatching(/^<EbbwirePortionFunction\w+\.Arn>$/),
      "Payload.$": "$",
    });
  });

  it("writes the workers' answers below the run, not through the execution", () => {
    expect(map.ResultWriter).toEqual({
      Resource: "arn:<AWS::Partition>:states:::s3:putObject",
      Parameters: { Bucket: expect.stringMatching(/^<EbbwireStore/), "Prefix.$": "$.resultsPrefix" },
    });
  });

  it("goes on with the chosen number of workers and share of failures", () => {
    expect(map).toMatchObject({ MaxConcurrency: 25, ToleratedFailurePercentage: 20 });
  });

  it("tries throttled, timed-out and unfinished workers again, and any other fault once", () => {
    for (const { Retry } of [map.ItemProcessor.States.Refit, definition.States.Close]) {
      expect(Retry[0].ErrorEquals).toEqual(
        expect.arrayContaining(["UnfinishedError", "Lambda.TooManyRequestsException", "States.Timeout"]),
      );
      expect(Retry[0]).toMatchObject({ MaxAttempts: 6, JitterStrategy: "FULL" });
      expect(Retry[1]).toMatchObject({ ErrorEquals: ["States.ALL"], MaxAttempts: 1 });
    }
  });

  it("closes with one message even when too much failed, and only then ends as failed", () => {
    expect(map.Catch).toEqual([{ ErrorEquals: ["States.ALL"], ResultPath: "$.fault", Next: "Close" }]);
    expect(map.Next).toBe("Close");
    const check = definition.States["Was it whole?"];
    expect(definition.States.Close.Next).toBe("Was it whole?");
    expect(check.Choices).toEqual([{ Variable: "$.fault", IsPresent: true, Next: "Too much failed" }]);
    expect(definition.States[check.Default].Type).toBe("Succeed");
    expect(definition.States["Too much failed"].Type).toBe("Fail");
  });

  it("tells closing when the fleet started and why, for the metrics and the log", () => {
    expect(definition.States.Close.Parameters.Payload).toEqual({
      "asOf.$": "$.asOf",
      "because.$": "$.because",
      "startedAt.$": "$$.Execution.StartTime",
    });
  });

  it("logs what happened without what was passed, and is traced", () => {
    expect(machine.Properties.LoggingConfiguration).toMatchObject({ Level: "ALL" });
    expect(machine.Properties.LoggingConfiguration.IncludeExecutionData).not.toBe(true);
    expect(machine.Properties.TracingConfiguration).toEqual({ Enabled: true });
  });

  it("reads the portions and writes the answers of runs, and touches nothing else of the bucket", () => {
    const [own] = Object.entries(policiesOf(template)).filter(([role]) => /^EbbwireFleetRole/.test(role));
    const store = own[1].filter(({ actions }) => actions.some((action) => action.startsWith("s3:")));
    const pairs = store.flatMap(({ actions, resources }) =>
      resources.flatMap((resource) =>
        actions.map((action) => `${action} ${resource.replace(/^<[^>]+>/, "")}`),
      ),
    );
    expect(pairs.sort()).toEqual([
      "s3:AbortMultipartUpload /team/runs/*/fleet/*",
      "s3:GetObject /team/runs/*/fleet/*",
      "s3:GetObject /team/runs/*/portions.json",
      "s3:ListMultipartUploadParts /team/runs/*/fleet/*",
      "s3:PutObject /team/runs/*/fleet/*",
    ]);
  });

  it("is not made for a deployment that never wants one", () => {
    const alone = templateOf({ fleet: "never" });
    alone.resourceCountIs("AWS::StepFunctions::StateMachine", 0);
    alone.resourceCountIs("AWS::Lambda::Function", 1);
  });
});

describe("the definition by itself", () => {
  it("is plain data that says the same each time", () => {
    const props = {
      partition: "aws",
      bucketName: "b",
      portionFunctionArn: "p",
      closingFunctionArn: "c",
      concurrency: 1,
      toleratedFailurePercentage: 0,
    };
    expect(JSON.stringify(fleetDefinition(props))).toBe(JSON.stringify(fleetDefinition(props)));
  });
});
