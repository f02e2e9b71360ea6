import { PutBucketPolicyCommand } from "@aws-sdk/client-s3";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { S3Store } from "../../lib/store/s3Store.ts";
import { policiesOf, textOf } from "../infra/policies.ts";
import { type AwsServices, awsServices } from "../support/awsServices.ts";
import { cephBucket, gateway, hasGateway, rawClient } from "../support/cephStore.ts";
import { driveFleet } from "../support/fleetDriver.ts";
import { type Bundles, type FunctionName, functionBundles } from "../support/functionBundles.ts";
import { fillStore, storeTexts } from "../support/jobStores.ts";
import { hasLambdaRuntime, type LambdaProcess, startLambda } from "../support/lambdaRuntime.ts";
import { tinyTables } from "../support/tinyTables.ts";
import { sampleEvent } from "./testCloud.ts";

if (!hasLambdaRuntime)
  console.warn(
    "\n*** THE BUNDLES ARE NOT RUN: no Lambda runtime client (apt-get install cmake g++ make python3, then npm ci in test/lambda-runtime) ***\n",
  );

// The real bundles on Node 24 under AWS's runtime client, on a real S3 server, each with exactly the rights of its
// role: the role's statements become the bucket's policy for a user who has no others.
describe.skipIf(!hasLambdaRuntime || !hasGateway)(
  "the deployed bundles under Lambda's runtime client",
  () => {
    const asOf = "2026-11-30T06:00:00Z";
    const run = "runs/2026-11-30T06-00-00Z/";
    const settings = {
      webhooks: [{ name: "counter", audience: "business", body: "text", address: "secret:CHAT" }],
    };
    const processes: LambdaProcess[] = [];
    let bundles: Bundles;
    let services: AwsServices;
    const secret = "k3]generated-at-deploy";

    beforeAll(async () => {
      bundles = await functionBundles();
      services = await awsServices(() => secret);
    });
    afterAll(async () => {
      for (const process of processes) await process.stop();
      services?.stop();
      await bundles?.remove();
    });

    /** A bucket with tables, which the guest may reach as the role of one function lets it. */
    async function world(texts: Record<string, string>) {
      const bucket = await cephBucket();
      const { endpoint, guest } = await gateway();
      const store = new S3Store(bucket, "", { endpoint });
      await fillStore(store, { ...texts, "settings.json": JSON.stringify(settings) });
      const allow = async (name: FunctionName, denied: readonly string[] = []) => {
        const policy = { Version: "2012-10-17", Statement: statements(name, bucket, guest.arn, denied) };
        await (await rawClient()).send(
          new PutBucketPolicyCommand({ Bucket: bucket, Policy: JSON.stringify(policy) }),
        );
      };
      const start = async (name: FunctionName, more: Record<string, string> = {}) => {
        const process = await startLambda(bundles.folders[name], {
          AWS_ACCESS_KEY_ID: guest.accessKey,
          AWS_SECRET_ACCESS_KEY: guest.secretKey,
          AWS_ENDPOINT_URL_S3: endpoint,
          ...services.environment,
          EBBWIRE_STORE: `s3://${bucket}`,
          EBBWIRE_DEPLOYMENT: "Bundled/Ebbwire",
          EBBWIRE_SECRET: "arn:aws:secretsmanager:us-east-1:123456789012:secret:Webhooks-AbCdEf",
          ...more,
        });
        processes.push(process);
        return process;
      };
      return { store, allow, start };
    }

    /** The S3 statements of a function's role, for this bucket and the guest. */
    function statements(name: FunctionName, bucket: string, guest: string, denied: readonly string[]) {
      const [own] = Object.entries(policiesOf(bundles.template)).filter(([role]) =>
        role.startsWith(`Ebbwire${name}Role`),
      );
      const arn = (resource: string) => resource.replace(/^<EbbwireStore\w+\.Arn>/, `arn:aws:s3:::${bucket}`);
      const allowed = own[1]
        .filter(({ actions }) => actions.some((action) => action.startsWith("s3:")))
        .map(({ actions, resources, conditions }) => ({
          Effect: "Allow",
          Principal: { AWS: [guest] },
          Action: actions,
          Resource: resources.map(arn),
          ...(Object.keys(conditions).length === 0 ? {} : { Condition: conditions }),
        }));
      expect(allowed.length).toBeGreaterThan(2);
      const forbidden = {
        Effect: "Deny",
        Principal: { AWS: [guest] },
        Action: ["s3:GetObject"],
        Resource: denied.map((key) => `arn:aws:s3:::${bucket}/${key}`),
      };
      // What the guest writes is the guest's own on this server: its owner lets the test look at it.
      const looking = {
        Effect: "Allow",
        Principal: { AWS: [`${guest.slice(0, guest.lastIndexOf("/"))}/test`] },
        Action: ["s3:GetObject", "s3:PutObject", "s3:ListBucket"],
        Resource: [`arn:aws:s3:::${bucket}`, `arn:aws:s3:::${bucket}/*`],
      };
      return [...allowed, looking, ...(denied.length === 0 ? [] : [forbidden])];
    }

    it("do a whole run, the same on a second trigger, with the rights of the role alone", async () => {
      const { store, allow, start } = await world(tinyTables());
      await allow("Scheduled");
      const lambda = await start("Scheduled");
      const first = await lambda.invoke(sampleEvent("scheduled"));
      expect(first).toMatchObject({
        answer: { outcome: "closed", asOf, by: "one function", tables: 3, left: 0, failedCount: 0 },
      });
      expect(first.answer.deliveries).toEqual(["counter: not-configured"]);
      const texts = await storeTexts(store);
      expect(Object.keys(texts)).toEqual(
        expect.arrayContaining([
          "forecasts/north/desk/latest.csv",
          `${run}report.html`,
          `${run}summary.json`,
        ]),
      );
      expect((await lambda.invoke(sampleEvent("scheduled"))).answer).toMatchObject({ outcome: "closed" });
      expect(await storeTexts(store)).toEqual(texts);
      expect(lambda.lines().filter(({ _aws }) => _aws)).toHaveLength(2);
    });

    it("answer the watch and a call by hand", async () => {
      const { allow, start } = await world(tinyTables());
      await allow("Scheduled");
      const lambda = await start("Scheduled");
      expect((await lambda.invoke(sampleEvent("watch"))).answer).toEqual({
        outcome: "watched",
        hoursSinceRun: 0,
      });
      expect((await lambda.invoke(sampleEvent("by-hand"))).answer).toMatchObject({
        outcome: "closed",
        tables: 3,
      });
      expect((await lambda.invoke(sampleEvent("watch"))).answer.hoursSinceRun).toBeLessThan(0.1);
    });

    it("report an event they do not understand as an error of that name", async () => {
      const { start } = await world({});
      const lambda = await start("Scheduled");
      expect((await lambda.invoke({ hello: "there" })).error).toMatchObject({ errorType: "EventError" });
    });

    it("run as a fleet over 40 portions, of which one is retried and two fail for good", async () => {
      const names = Array.from({ length: 40 }, (_, index) => `table-${String(index + 1).padStart(2, "0")}`);
      const [table] = Object.values(tinyTables());
      const { store, allow, start } = await world(
        Object.fromEntries(names.map((name) => [`series/${name}.csv`, table])),
      );
      // The plan that stands is the plan: here with one table a portion.
      const plan = { schema: 1, asOf, tables: names, portions: names.map((name) => [name]), refused: [] };
      await fillStore(store, { [`${run}plan.json`]: JSON.stringify(plan) });

      await allow("Scheduled");
      const machine = "arn:aws:states:us-east-1:123456789012:stateMachine:fleet";
      const scheduled = await start("Scheduled", { EBBWIRE_STATE_MACHINE: machine, EBBWIRE_FLEET: "always" });
      expect((await scheduled.invoke(sampleEvent("scheduled"))).answer).toMatchObject({
        outcome: "handed over",
        portions: 40,
        execution: "started",
      });
      const { operation, body } = services.requests.at(-1) ?? { operation: "", body: {} };
      expect(operation).toBe("StartExecution");
      expect(body).toMatchObject({ stateMachineArn: machine, name: "run-2026-11-30T06-00-00Z" });

      const [[, { Properties }]] = Object.entries(
        bundles.template.findResources("AWS::StepFunctions::StateMachine"),
      );
      const definition = JSON.parse(textOf(Properties.DefinitionString));
      const denied = ["table-07", "table-23"];
      const portion = await start("Portion");
      const closing = await start("Closing");
      const end = await driveFleet(definition, JSON.parse(body.input), {
        read: async (key) => new TextDecoder().decode((await store.read(key))?.bytes),
        write: (key, text) => store.write(key, new TextEncoder().encode(text)),
        invoke: async (name, payload, attempt) => {
          const isPortion = name.includes("Portion");
          await allow(
            isPortion ? "Portion" : "Closing",
            isPortion ? denied.map((one) => `series/${one}.csv`) : [],
          );
          const late = JSON.stringify(payload).includes("table-11") && attempt === 1;
          return (isPortion ? portion : closing).invoke(payload, { milliseconds: late ? 5_000 : 900_000 });
        },
      });

      expect(end.status).toBe("SUCCEEDED"); // two of forty are within the tolerated tenth
      expect(end.failedPortions.map(({ Items }) => Items[0].tables[0])).toEqual(denied);
      const { Retry } = definition.States.Portions.ItemProcessor.States.Refit;
      expect(end.retries).toBe(1 + 2 * Retry[0].MaxAttempts);
      expect(end.output).toMatchObject({
        outcome: "closed",
        by: "fleet",
        because: "chosen for this deployment",
        tables: 38,
        left: 2,
      });
      expect(closing.lines().find(({ _aws }) => _aws)).toMatchObject({ Tables: 38, Left: 2 });

      const texts = await storeTexts(store);
      expect(Object.keys(texts).filter((key) => key.endsWith("/latest.csv"))).toHaveLength(38);
      expect(Object.keys(texts).filter((key) => key.includes("/message-business"))).toHaveLength(1);
      for (const name of denied) expect(texts[`${run}message-business.json`]).toContain(name);

      // Redriven after the fault is mended: the two are done, nothing else is done again.
      const before = await storeTexts(store);
      const again = await driveFleet(definition, JSON.parse(body.input), {
        read: async (key) => new TextDecoder().decode((await store.read(key))?.bytes),
        write: async () => undefined,
        invoke: async (name, payload) => {
          const isPortion = name.includes("Portion");
          await allow(isPortion ? "Portion" : "Closing");
          return (isPortion ? portion : closing).invoke(payload);
        },
      });
      expect(again).toMatchObject({ status: "SUCCEEDED", retries: 0, output: { tables: 40, left: 0 } });
      const after = await storeTexts(store);
      for (const key of Object.keys(before).filter((one) => /^(models|forecasts)\//.test(one)))
        expect(after[key]).toBe(before[key]);
    });
  },
);
