import { createServer } from "node:http";
import type { AddressInfo } from "node:net";

/** Step Functions and Secrets Manager, as far as the functions ask them, on loopback. */
export interface AwsServices {
  readonly environment: Readonly<Record<string, string>>;
  // biome-ignore lint/suspicious/noExplicitAny: requests are looked into freely
  readonly requests: { readonly operation: string; readonly body: any }[];
  stop(): void;
}

/**
 * Answers `GetSecretValue` with the given text, and `StartExecution` as Step Functions does: a name that was used is
 * `ExecutionAlreadyExists` once `ended` says that its execution has ended.
 * Protocols: AWS JSON 1.0 and 1.1 (smithy.io), which name the operation in `X-Amz-Target`.
 */
export async function awsServices(secret: () => string, ended = () => false): Promise<AwsServices> {
  const requests: AwsServices["requests"] = [];
  const names = new Set<string>();
  const server = createServer(async (request, response) => {
    const pieces: Buffer[] = [];
    for await (const piece of request) pieces.push(piece);
    const body = JSON.parse(Buffer.concat(pieces).toString());
    const operation = String(request.headers["x-amz-target"]).split(".")[1];
    requests.push({ operation, body });
    const answer = (status: number, document: object) =>
      response
        .writeHead(status, { "Content-Type": "application/x-amz-json-1.1" })
        .end(JSON.stringify(document));
    if (operation === "GetSecretValue") {
      answer(200, { ARN: body.SecretId, Name: "webhooks", SecretString: secret() });
    } else if (names.has(body.name) && ended()) {
      answer(400, { __type: "ExecutionAlreadyExists", message: "Execution already exists" });
    } else {
      names.add(body.name);
      const executionArn = `${body.stateMachineArn.replace(":stateMachine:", ":execution:")}:${body.name}`;
      answer(200, { executionArn, startDate: 1_796_018_400 });
    }
  });
  await new Promise<void>((done) => server.listen(0, "127.0.0.1", done));
  const endpoint = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
  return {
    environment: { AWS_ENDPOINT_URL_SECRETS_MANAGER: endpoint, AWS_ENDPOINT_URL_SFN: endpoint },
    requests,
    stop: () => {
      server.close();
      server.closeAllConnections();
    },
  };
}
