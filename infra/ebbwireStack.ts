import { CfnOutput, Stack, type StackProps } from "aws-cdk-lib";
import type { Construct } from "constructs";
import { Ebbwire, type EbbwireProps } from "./ebbwire.ts";

/** The construct as a stack of its own, with outputs that say what to do next. */
export class EbbwireStack extends Stack {
  readonly ebbwire: Ebbwire;

  constructor(scope: Construct, id: string, props: StackProps & { readonly choices: EbbwireProps }) {
    const { choices, ...stackProps } = props;
    super(scope, id, stackProps);
    this.ebbwire = new Ebbwire(this, "Ebbwire", choices);
    const { bucket, webhookSecret, scheduledFunction } = this.ebbwire;
    const prefix = choices.prefix === undefined ? "" : `${choices.prefix}/`;
    const output = (name: string, description: string, value: string) =>
      new CfnOutput(this, name, { description, value });
    output("StoreBucket", "Holds your tables and everything written from them", bucket.bucketName);
    output(
      "Next1DropTable",
      "Drop the first table",
      `aws s3 cp my-table.csv s3://${bucket.bucketName}/${prefix}series/my-table.csv`,
    );
    output(
      "Next2PutSecret",
      "Put the webhook's address; settings.json names it as secret:CHAT",
      `aws secretsmanager put-secret-value --secret-id ${webhookSecret.secretArn} --secret-string '{"CHAT":"https://..."}'`,
    );
    output(
      "Next3RunNow",
      "Run once now instead of waiting for the schedule",
      `aws lambda invoke --function-name ${scheduledFunction.functionName} --cli-binary-format raw-in-base64-out --cli-read-timeout 900 --payload '{"asOf":"now"}' answer.json`,
    );
  }
}
